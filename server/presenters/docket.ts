import type { BallotShown, DocketItem } from '../../shared/schemas/panel'
import type { DocketRow } from '../read-models/panel/docket'
import { writtenNet } from './desk'

export interface ItemParts {
  readonly ballots: readonly (BallotShown & { readonly userId: number })[]
  readonly viewer: number
  readonly isClosed: boolean
  readonly names: ReadonlyMap<number, string>
  readonly stakes: readonly string[]
}

/** One item of a docket: others' ballots only when the sitting is closed, no figure for the pair that measures blind. */
export function presentItem(row: DocketRow, { ballots, viewer, isClosed, names, stakes }: ItemParts): DocketItem {
  const pair = [row.judge_a, row.judge_b].filter((id): id is number => id !== null)
  const isBlind = row.second_measuring_due === 1 && pair.includes(viewer) && !row.measured_again && !isClosed
  const shown = (ballot: BallotShown): BallotShown => ({ judge: ballot.judge, vote: ballot.vote, ground: ballot.ground, reason: ballot.reason, requests: ballot.requests })
  const own = ballots.find(ballot => ballot.userId === viewer)
  return {
    id: row.uid, entryId: row.entry_uid, kind: row.kind, position: row.position, state: row.state, entryState: row.entry_state,
    category: row.category, district: row.district, person: row.person,
    net: isBlind || stakes.length > 0 ? null : writtenNet(row.net16, row.step),
    secondDue: row.second_measuring_due === 1 && !row.measured_again, pair: pair.map(id => names.get(id) ?? ''),
    outcome: row.outcome, ground: row.ground, reason: row.reason,
    voting: ballots.filter(ballot => ballot.vote !== 'stand_aside').length,
    standingAside: ballots.filter(ballot => ballot.vote === 'stand_aside').length,
    mine: own ? { vote: own.vote, ground: own.ground, reason: own.reason, requests: own.requests } : null,
    stakes, onHold: row.hold_at !== null,
    ballots: isClosed ? ballots.map(shown) : [],
  }
}

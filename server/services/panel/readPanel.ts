import type { ActiveActor } from '../../../shared/domain/access/roles'
import { hasAnyRole } from '../../../shared/domain/access/roles'
import { canPlanSittings } from '../../../shared/domain/access/abilities'
import { stakesOf } from '../../../shared/domain/access/stakes'
import { daysBetween } from '../../../shared/domain/dates'
import type { Vote } from '../../../shared/domain/workflow/panel'
import { DomainError } from '../../../shared/errors'
import type { DocketItem, PanelAnswer, SittingShown } from '../../../shared/schemas/panel'
import { isoTime as iso } from '../../../db/time'
import { dayIn } from '../../clock'
import type { Registry } from '../../composition'
import { presentItem } from '../../presenters/docket'
import { writtenNet } from '../../presenters/desk'
import { docketOf, itemsWithoutSitting, judgesNow, sittingsFor, type DocketRow } from '../../read-models/panel/docket'
import { namesOf } from '../../read-models/desk/file'
import { findEntry } from '../../repositories/entries'
import { listPeople } from '../../repositories/entryPeople'
import { findSitting, listBallots, listJudges } from '../../repositories/panel'
import { findKeys, loadStakes } from '../entries/context'
import { momentOf } from '../moment'
import { loadCurrentWorkflow } from '../workflow/load'

const MOST_SITTINGS = 60

/** The panel's room: sittings that concern whoever asks, and what no sitting has yet for whoever may plan one. */
export async function readPanel(registry: Registry, actor: ActiveActor): Promise<PanelAnswer> {
  const { db } = registry
  const moment = await momentOf(registry)
  const mayPlan = canPlanSittings(actor)
  const [sittings, waiting, judges] = await Promise.all([
    sittingsFor(db, actor.userId, mayPlan, MOST_SITTINGS), mayPlan ? itemsWithoutSitting(db) : [], mayPlan ? judgesNow(db, moment.at) : [],
  ])
  return {
    sittings: sittings.map(row => ({
      id: row.uid, heldOn: row.held_on, place: row.place, state: row.state, chair: row.chair, isChair: row.chair_user_id === actor.userId,
      isJudge: Boolean(row.is_judge), items: Number(row.items), toVote: row.is_judge && row.state === 'open' ? Number(row.to_vote) : 0, daysUntil: daysBetween(moment.today, row.held_on),
    })),
    waiting: waiting.map(row => ({
      id: row.uid, entryId: row.entry_uid, kind: row.kind, category: row.category, district: row.district, person: row.person, net: writtenNet(row.net16, row.step),
      days: Math.max(0, daysBetween(dayIn(moment.zone, new Date(row.since)), moment.today)),
    })),
    judges: judges.map(judge => ({ id: judge.uid, name: judge.name })),
    mayPlan,
    today: moment.today,
  }
}

/**
 * A sitting with its docket. Judges of it, its chair and whoever plans sittings may look; ballots of others are shown when it is
 * closed, until then only how many count.
 *
 * @throws DomainError `not_found`
 */
export async function readSitting(registry: Registry, actor: ActiveActor, uid: string): Promise<SittingShown> {
  const { db } = registry
  const sitting = await findSitting(db, uid)
  if (!sitting) throw new DomainError('not_found')
  const judges = await listJudges(db, sitting.id)
  const isJudge = judges.some(judge => judge.user_id === actor.userId)
  const isChair = sitting.chair_user_id === actor.userId
  if (!(hasAnyRole(actor, ['judge']) && (isJudge || isChair)) && !canPlanSittings(actor)) throw new DomainError('not_found')
  const [rows, workflow, { societyName }, keys] = await Promise.all([docketOf(db, sitting.id), loadCurrentWorkflow(db), registry.settings(), findKeys(db, actor.userId)])
  const names = await namesOf(db, [sitting.chair_user_id, ...rows.flatMap(row => [row.judge_a, row.judge_b])])
  const items: DocketItem[] = []
  for (const row of rows) {
    const ballots = await listBallots(db, row.id)
    items.push(presentItem(row, {
      ballots: ballots.map(ballot => ({ userId: ballot.judge_user_id, judge: ballot.judge_name, vote: ballot.vote as Vote, ground: ballot.ground, reason: ballot.reason, requests: JSON.parse(ballot.requests ?? '[]') as string[] })),
      viewer: actor.userId, isClosed: sitting.state === 'closed', names, stakes: await stakesIn(registry, row, keys),
    }))
  }
  return {
    id: sitting.uid, heldOn: sitting.held_on, place: sitting.place, state: sitting.state,
    openedAt: sitting.opened_at === null ? null : iso(sitting.opened_at), closedAt: sitting.closed_at === null ? null : iso(sitting.closed_at),
    chair: { id: judges.find(judge => judge.user_id === sitting.chair_user_id)?.uid ?? '', name: names.get(sitting.chair_user_id) ?? '' },
    isChair, isJudge, mayPlan: canPlanSittings(actor),
    judges: judges.map(judge => ({ id: judge.uid, name: judge.name, present: judge.present === 1, isMe: judge.user_id === actor.userId })),
    quorum: workflow.limits.quorum, items, society: societyName,
  }
}

async function stakesIn(registry: Registry, row: DocketRow, keys: Awaited<ReturnType<typeof findKeys>>): Promise<string[]> {
  const entry = await findEntry(registry.db, row.entry_uid)
  if (!entry) return []
  const stakes = stakesOf(await loadStakes(registry.db, entry, await listPeople(registry.db, entry.id)), keys, 'vote')
  return stakes.map(stake => 'part' in stake ? `${stake.kind}.${stake.part}` : stake.kind)
}

import type { Knex } from 'knex'
import type { ActiveActor } from '../../../shared/domain/access/roles'
import { canReadEntry } from '../../../shared/domain/access/abilities'
import type { ActInput, Performer } from '../../../shared/domain/workflow/facts'
import { transition, type Move } from '../../../shared/domain/workflow/transition'
import { DomainError } from '../../../shared/errors'
import { inTransaction } from '../../../db/transaction'
import type { EntriesRow } from '../../../db/tables'
import { dayIn } from '../../clock'
import type { Registry } from '../../composition'
import { findClass, type ClassRecord } from '../../repositories/catalogue'
import { lockEntry, updateEntry } from '../../repositories/entries'
import { findSitting, listJudges } from '../../repositories/panel'
import { findAccountByUid } from '../../repositories/stakes'
import { appendEvent } from '../events/append'
import { momentOf, type Moment } from '../moment'
import { verifyPassword } from '../people/verifyPassword'
import { loadWorkflow, type Workflow } from '../workflow/load'
import { accessOf } from './access'
import { findKeys, loadContext, type EntryContext } from './context'
import { EFFECTS } from './effects/index'
import type { EffectContext } from './effects/context'
import { loadCandidate, loadFacts, loadOtherClass } from './facts'
import type { MoveInput, ResolvedInput } from './moveInput'
import { refusalError } from './refusal'
import { tellAll } from './tell'

export interface MoveResult {
  readonly uid: string
  readonly move: Move
  /** what only the caller learns, such as a claim code */
  readonly told: Readonly<Record<string, string>>
}

interface Act {
  readonly trx: Knex.Transaction
  readonly entry: EntriesRow
  readonly performer: Performer
  readonly input: MoveInput
  readonly moment: Moment
  readonly passwordVerified: boolean
}

async function resolve(trx: Knex.Transaction, input: MoveInput): Promise<ResolvedInput & { otherClass: ClassRecord | null }> {
  const account = async (uid: string, path: string) => {
    const found = await findAccountByUid(trx, uid)
    if (!found) throw new DomainError('invalid_input', { fields: [{ path, code: 'unknown' }] })
    return found.id
  }
  const otherClass = input.category === undefined ? null : await findClass(trx, input.category)
  if (otherClass === undefined) throw new DomainError('invalid_input', { fields: [{ path: 'category', code: 'unknown' }] })
  const sitting = input.sitting === undefined ? null : await findSitting(trx, input.sitting)
  if (sitting === undefined || sitting?.state === 'closed') throw new DomainError('invalid_input', { fields: [{ path: 'sitting', code: 'unknown' }] })
  const judges = input.judges && [await account(input.judges[0], 'judges.0'), await account(input.judges[1], 'judges.1')] as const
  if (judges) await assertJudges(trx, judges, sitting?.id ?? null)
  return {
    ...input,
    otherClass,
    ...(input.measurer === undefined ? {} : { measurerUserId: await account(input.measurer, 'measurer') }),
    ...(sitting ? { sittingId: sitting.id } : {}),
    ...(judges ? { judgeUserIds: judges } : {}),
  }
}

async function assertJudges(trx: Knex.Transaction, pair: readonly [number, number], sittingId: number | null): Promise<void> {
  const named = sittingId === null ? null : (await listJudges(trx, sittingId)).map(judge => judge.user_id)
  const wrong = pair.findIndex((id, place) => (named !== null && !named.includes(id)) || pair.indexOf(id) !== place)
  if (wrong >= 0) throw new DomainError('invalid_input', { fields: [{ path: `judges.${wrong}`, code: 'not_of_sitting' }] })
}

async function actInput(act: Act, context: EntryContext, input: ResolvedInput & { otherClass: ClassRecord | null }): Promise<ActInput> {
  const { trx, moment } = act
  return {
    transition: input.transition, comment: input.comment, confirm: input.confirm, place: input.place, ground: input.ground, reason: input.reason, text: input.text,
    ...(input.at === undefined ? {} : { onDay: dayIn(moment.zone, new Date(input.at)) }),
    ...(input.changes === undefined ? {} : { changes: Object.keys(input.changes) }),
    passwordVerified: act.passwordVerified,
    candidate: input.measurerUserId === undefined ? null : await loadCandidate(trx, context, input.measurerUserId, moment),
    otherClass: input.otherClass === null ? null : await loadOtherClass(trx, context, input.otherClass, moment),
  }
}

/**
 * Moves an entry whose row is locked: rules, effects, state, event and notices, all in the caller's transaction. The only place
 * that writes `entries.state` of an entry that exists.
 */
export async function performMove(act: Act, workflow?: Workflow): Promise<MoveResult> {
  const { trx, entry, performer, moment } = act
  const flow = workflow ?? await loadWorkflow(trx, entry.workflow_version_id)
  const context = await loadContext(trx, entry)
  const facts = await loadFacts(trx, context, flow, moment)
  const { otherClass, ...input } = await resolve(trx, act.input)
  const verdict = transition(flow.rows, facts, performer, await actInput(act, context, { ...input, otherClass }), { today: moment.today, limits: flow.limits })
  if (!verdict.ok) {
    if (verdict.refusal.kind !== 'forbidden' && verdict.refusal.kind !== 'unknown_transition') assertVersion(entry, input.version)
    throw refusalError(verdict.refusal)
  }
  assertVersion(entry, input.version)
  const actor = performer.kind === 'person' ? performer.actor : null
  const effect: EffectContext = {
    trx, context, facts, move: verdict, input, actor, workflow: flow, moment, otherClass, patch: {}, args: {}, texts: {}, says: {}, told: {}, holders: [],
  }
  await carryOut(effect)
  return { uid: entry.uid, move: verdict, told: effect.told }
}

/** The panel, the clock and the system name no version: they hold the lock and know what they found. */
export const ANY_VERSION = 0

function assertVersion(entry: EntriesRow, version: number): void {
  if (version !== ANY_VERSION && entry.version !== version) throw new DomainError('version_conflict', { details: { version: entry.version } })
}

/** The ground that the ballots gave, where the panel's decision rests on one. */
function panelGround({ actor, move, facts }: EffectContext): { ground?: string } {
  const ground = facts.decision?.ground
  return actor === null && ground && move.row.guards.includes('ground_and_reason') ? { ground } : {}
}

/** Runs the effects of a move that the rules allow, then writes state, event and notices. */
export async function carryOut(effect: EffectContext): Promise<void> {
  const { trx, context, move, moment, patch, input } = effect
  const { entry } = context
  for (const name of move.effects) await EFFECTS[name](effect)
  const moves = move.to !== move.from
  await updateEntry(trx, entry.id, {
    due_on: move.dueOn,
    return_to: move.returnTo as EntriesRow['return_to'],
    ...patch,
    ...(moves ? { state: move.to, state_since: moment.at } : {}),
  })
  await appendEvent(trx, entry, {
    kind: move.row.code, from: move.from, to: move.to, actor: effect.actor, args: { ...panelGround(effect), ...effect.args },
    texts: { comment: input.comment, reason: input.reason ?? (effect.actor ? undefined : effect.facts.decision?.reason), text: input.text, ...effect.texts },
  }, moment)
  await tellAll(effect)
}

/**
 * Moves an entry as a person. Throws DomainError: 404 for an entry that is not theirs to see, 403 (role or stake), 409 (another
 * version, or not from this state), 422 with the guards that failed.
 */
export async function moveEntry(registry: Registry, actor: ActiveActor, uid: string, input: MoveInput): Promise<MoveResult> {
  const passwordVerified = input.password !== undefined
  if (input.password !== undefined) await verifyPassword(registry, actor, input.password, { code: input.code })
  const moment = await momentOf(registry)
  return inTransaction(registry.db, async (trx) => {
    const entry = await lockEntry(trx, uid)
    if (!entry || !canReadEntry(actor, await accessOf(trx, entry))) throw new DomainError('not_found')
    const performer: Performer = { kind: 'person', actor, keys: await findKeys(trx, actor.userId) }
    return performMove({ trx, entry, performer, input, moment, passwordVerified })
  })
}

import { createHash } from 'node:crypto'
import type { Knex } from 'knex'
import { inTransaction } from '../../../db/transaction'
import type { ActiveActor } from '../../../shared/domain/access/roles'
import { hasAnyRole } from '../../../shared/domain/access/roles'
import { canonicalText, type Json } from '../../../shared/domain/canonical'
import { currentDefinition, readMeasurements, type Category } from '../../../shared/domain/measuring/index'
import type { Performer } from '../../../shared/domain/workflow/facts'
import { transition } from '../../../shared/domain/workflow/transition'
import { DomainError } from '../../../shared/errors'
import type { BeginForInput, CreateEntryInput } from '../../../shared/schemas/entries'
import type { Registry } from '../../composition'
import { findEntry, insertAnimal, insertEntry, lockEntryById } from '../../repositories/entries'
import { insertSheet, nextSheetNumber } from '../../repositories/sheets'
import { findAccountByUid } from '../../repositories/stakes'
import { momentOf, newUid, type Moment } from '../moment'
import { figuresOf, hasReadings } from '../sheets/read'
import { loadCurrentWorkflow, type Workflow } from '../workflow/load'
import { findKeys, loadContext } from './context'
import { mintClaimCode } from './claimCode'
import type { EffectContext } from './effects/context'
import { loadCandidate, loadFacts } from './facts'
import { factRow } from './factRow'
import { carryOut } from './move'
import { setPeople } from './people'
import { refusalError } from './refusal'

export interface Created {
  readonly uid: string
  /** false where the same entry was there already */
  readonly isNew: boolean
  /** what only the caller learns, such as a claim code */
  readonly told: Readonly<Record<string, string>>
}

interface Begin {
  readonly transition: 'begin' | 'begin_for'
  readonly input: CreateEntryInput
  readonly ownerUserId: number | null
  readonly toBench: boolean
}

const contentHash = (input: object) => createHash('sha256').update(canonicalText(JSON.parse(JSON.stringify(input)) as Json)).digest('hex')

/**
 * An entry of the same id: the answer where owner and content are the same, a refusal otherwise. Whoever began it for somebody
 * is told a new code while nobody has claimed it: the first one may never have reached them, and is kept as a hash alone.
 */
async function sameAgain(registry: Registry, actor: ActiveActor, uid: string, hash: string, moment: Moment): Promise<Created | null> {
  const entry = await findEntry(registry.db, uid)
  if (!entry) return null
  if (entry.begun_by_user_id !== actor.userId || entry.client_content_hash !== hash) throw new DomainError('duplicate', { fields: [{ path: 'id', code: 'taken' }] })
  return { uid, isNew: false, told: entry.owner_user_id === null ? { claimCode: await mintClaimCode(registry.db, uid, moment) } : {} }
}

async function keepRough(trx: Knex.Transaction, entryId: number, ownerUserId: number | null, category: string, rough: Record<string, unknown>, moment: Moment): Promise<void> {
  const definition = currentDefinition(category as Category)
  const { measurements, problems } = readMeasurements(definition, rough)
  if (problems.length > 0) {
    throw new DomainError('invalid_input', { fields: problems.slice(0, 100).map(problem => ({ path: problem.path ? `rough.${problem.path}` : 'rough', code: problem.code })) })
  }
  if (!hasReadings(measurements)) return
  await insertSheet(trx, {
    uid: newUid(moment.now), entry_id: entryId, kind: 'rough', number: await nextSheetNumber(trx, entryId, 'rough'), definition: definition.id,
    measurements: JSON.stringify(measurements), ...figuresOf(definition, measurements), owner_user_id: ownerUserId, created_at: moment.at,
  })
}

async function write(trx: Knex.Transaction, actor: ActiveActor, workflow: Workflow, { input, ownerUserId, transition: code, toBench }: Begin, uid: string, hash: string, moment: Moment): Promise<Created> {
  const { id: _, rough, people = [], hunterName, ...facts } = input
  const { patch, category } = await factRow(trx, facts, moment)
  const animalId = await insertAnimal(trx, { uid: newUid(moment.now), species_id: category!.species_id, created_at: moment.at })
  const entryId = await insertEntry(trx, {
    uid, animal_id: animalId, class_id: category!.id, origin: input.origin, workflow_version_id: workflow.id, state: 'draft', state_since: moment.at,
    owner_user_id: ownerUserId, begun_by_user_id: actor.userId, begun_at: moment.at, created_at: moment.at, client_content_hash: hash,
    ...patch, ...toBench ? { measurer_user_id: actor.userId } : {},
  })
  const hunter = hunterName !== undefined && !people.some(person => person.part === 'hunter')
    ? [{ part: 'hunter' as const, name: hunterName, isMinor: false, isMe: false }]
    : []
  await setPeople(trx, { id: entryId, ownerUserId }, [...hunter, ...people], moment)
  if (rough) await keepRough(trx, entryId, ownerUserId, category!.code, rough, moment)
  return begin(trx, actor, workflow, entryId, code, toBench, moment)
}

/** Runs the rules of the beginning transition over the entry that now exists, then its effects, event and notices. */
async function begin(trx: Knex.Transaction, actor: ActiveActor, workflow: Workflow, entryId: number, code: Begin['transition'], toBench: boolean, moment: Moment): Promise<Created> {
  const entry = (await lockEntryById(trx, entryId))!
  const context = await loadContext(trx, entry)
  const facts = { ...await loadFacts(trx, context, workflow, moment), state: null }
  const performer: Performer = { kind: 'person', actor, keys: await findKeys(trx, actor.userId) }
  const me = toBench ? await findAccountByUid(trx, actor.uid) : undefined
  const verdict = transition(workflow.rows, facts, performer, {
    transition: code, candidate: me ? await loadCandidate(trx, context, me.id, moment) : null,
  }, { today: moment.today, limits: workflow.limits })
  if (!verdict.ok) throw refusalError(verdict.refusal)
  const effect: EffectContext = {
    trx, context, facts, move: verdict, actor, workflow, moment, otherClass: null, patch: {}, args: {}, texts: {}, says: {}, told: {}, holders: [],
    input: { transition: code, version: entry.version, ...me ? { measurer: actor.uid, measurerUserId: me.id } : {} },
  }
  await carryOut(effect)
  return { uid: entry.uid, isNew: true, told: effect.told }
}

/** Begins an entry of one's own. With a client-made id a repetition of the same content answers as the first did. */
export async function createEntry(registry: Registry, actor: ActiveActor, input: CreateEntryInput): Promise<Created> {
  return beginAs(registry, actor, { transition: 'begin', input, ownerUserId: actor.userId, toBench: false })
}

/** Begins an entry for somebody who claims it by a code: a walk-in at a bench, a customer of a shop. */
export async function beginFor(registry: Registry, actor: ActiveActor, { toBench, claimantEmail: _, ...input }: BeginForInput): Promise<Created> {
  if (!hasAnyRole(actor, ['measurer', 'shop'])) throw new DomainError('forbidden')
  return beginAs(registry, actor, { transition: 'begin_for', input, ownerUserId: null, toBench })
}

async function beginAs(registry: Registry, actor: ActiveActor, start: Begin): Promise<Created> {
  const moment = await momentOf(registry)
  const uid = start.input.id ?? newUid(moment.now)
  const hash = contentHash({ ...start.input, how: start.transition })
  const again = start.input.id ? await sameAgain(registry, actor, uid, hash, moment) : null
  if (again) return again
  const workflow = await loadCurrentWorkflow(registry.db)
  try {
    return await inTransaction(registry.db, trx => write(trx, actor, workflow, start, uid, hash, moment))
  }
  catch (error) {
    // Two of the same request at once: the one that came second is answered as the first.
    if (start.input.id && error instanceof DomainError && error.code === 'duplicate') {
      const first = await sameAgain(registry, actor, uid, hash, moment)
      if (first) return first
    }
    throw error
  }
}

import { createHash, randomUUID } from 'node:crypto'
import { hash as argon2 } from '@node-rs/argon2'
import { sqlTime } from '../../db/time'
import type { ActiveActor, Role } from '../../shared/domain/access/roles'
import { checksFor } from '../../shared/domain/workflow/checks'
import { PAPERS, type DocumentKind } from '../../shared/domain/workflow/origins'
import { CLASSES } from '../../seeds/reference/classes'
import { createEntry } from '../../server/services/entries/create'
import { moveEntry, type MoveResult } from '../../server/services/entries/move'
import type { MoveInput } from '../../server/services/entries/moveInput'
import { askRequest, answerRequest, setCheck } from '../../server/services/office/requests'
import { castBallot, type Ballot } from '../../server/services/panel/ballots'
import { closeSitting } from '../../server/services/panel/close'
import { openSitting, planSitting } from '../../server/services/panel/sittings'
import { saveSheet } from '../../server/services/sheets/save'
import { makePerson } from './people'
import type { TestRegistry } from './registry'

export const PASSWORD = 'a password of the tests'
/** Quick to make; the product's own costs are tested with sign-in. */
const QUICK = { memoryCost: 1024, timeCost: 1, parallelism: 1 }

/** A typical mule deer: the contract's example without its abnormal point, so that its net is 171 1/8. */
export const DEER = {
  insideSpread: '22 3/8', tipToTip: '18 1/8', greatestSpread: '25 6/8', abnormalPoints: [],
  right: { mainBeam: '23 1/8', g1: '2 4/8', g2: '14 2/8', g3: '9 0/8', g4: '10 1/8', h1: '4 5/8', h2: '4 1/8', h3: '4 0/8', h4: '3 7/8', points: 5 },
  left: { mainBeam: '22 7/8', g1: '2 2/8', g2: '13 6/8', g3: '9 3/8', g4: '10 0/8', h1: '4 4/8', h2: '4 1/8', h3: '4 0/8', h4: '4 0/8', points: 5 },
}

export interface Cast {
  readonly entrant: ActiveActor
  readonly other: ActiveActor
  readonly shop: ActiveActor
  readonly measurer: ActiveActor
  readonly measurer2: ActiveActor
  readonly reviewer: ActiveActor
  readonly reviewer2: ActiveActor
  readonly registrar: ActiveActor
  /** the first is the chair of the sittings of the scene */
  readonly judges: readonly ActiveActor[]
}

/** Stages that an ordinary entry passes, in order. */
export const STAGES = ['draft', 'measuring', 'certified', 'in_review', 'at_panel', 'accepted'] as const
export type Stage = (typeof STAGES)[number]

export interface Scene {
  readonly cast: Cast
  person(roles: readonly Role[], name?: string): Promise<ActiveActor>
  /** An entry of the entrant, brought to a stage by the acts of the people it takes. */
  entry(stage: Stage, wishes?: EntryWishes): Promise<string>
  state(uid: string): Promise<string>
  version(uid: string): Promise<number>
  move(actor: ActiveActor, uid: string, input: Omit<MoveInput, 'version'> & { version?: number }): Promise<MoveResult>
  papers(uid: string, kinds: readonly DocumentKind[]): Promise<void>
  statement(uid: string, part?: 'hunter' | 'finder' | 'owner' | 'guardian' | 'heir'): Promise<void>
  pay(uid: string, amount?: number): Promise<void>
  tickAll(uid: string, reviewer?: ActiveActor): Promise<void>
  measure(uid: string, measurements?: object, more?: object): Promise<void>
  /** A sitting of the scene's judges, planned; with `open` it takes votes. */
  sitting(open?: boolean, judges?: readonly ActiveActor[]): Promise<string>
  itemOf(uid: string): Promise<{ uid: string, state: string, outcome: string | null, sitting: string | null, second: number, reason: string | null }>
  /** Votes of the scene's judges on an entry's item, in their order. */
  vote(uid: string, votes: readonly (Ballot['vote'] | Ballot)[], judges?: readonly ActiveActor[]): Promise<void>
  close(sitting: string): Promise<void>
}

export interface EntryWishes {
  readonly measurements?: object
  readonly category?: string
  readonly people?: readonly object[]
  readonly takenOn?: string
  readonly sitting?: string
}

const DISTRICT = { code: 'alderfall', name: 'Alderfall' }

async function furnish(registry: TestRegistry): Promise<void> {
  const { db } = registry
  await db('settings').where({ name: 'timeZone' }).update({ value: JSON.stringify('America/Denver') })
  await db('classes').whereIn('code', ['mule-deer-typical', 'mule-deer-nontypical', 'black-bear']).update({ offered: 1 })
  if (CLASSES.length === 0 || await db('districts').where({ code: DISTRICT.code }).first('id')) return
  await db('districts').insert([{ ...DISTRICT, sort: 1 }, { code: 'brackwater', name: 'Brackwater', sort: 2 }])
  const [term] = await db('minimums_terms').insert({ label: '2025 to 2027', from_on: '2025-01-01', to_on: '2027-12-31' })
  const classes = await db('classes').whereIn('code', ['mule-deer-typical', 'mule-deer-nontypical', 'black-bear']).select('id', 'code')
  const min: Record<string, number> = { 'mule-deer-typical': 158 * 16, 'mule-deer-nontypical': 165 * 16, 'black-bear': 18 * 16 + 3 }
  await db('minimums').insert(classes.map(row => ({ term_id: term!, class_id: row.id, min16: min[row.code]! })))
  await db('fee_versions').insert({ version: 1, from_on: '2025-01-01', currency: 'USD', created_at: '2025-01-01 00:00:00.000' })
  await db('fees').insert({ version: 1, class_id: null, amount_minor: 4000, currency: 'USD' })
}

/** The society's people and one of everything that an entry needs, for the tests of one file. */
export async function makeScene(registry: TestRegistry): Promise<Scene> {
  const { db } = registry
  await furnish(registry)
  const passwordHash = await argon2(PASSWORD, QUICK)
  const NAMES = ['Orrin', 'Maelle', 'Tavish', 'Ysolde', 'Brannoch', 'Cerys', 'Doran', 'Elspeth', 'Fergal', 'Gwenna', 'Hollis', 'Idris', 'Jorunn', 'Kestra', 'Lorcan', 'Merrin', 'Nessa', 'Osric', 'Perrin', 'Quilla']
  let made = 0
  const person = async (roles: readonly Role[], name?: string): Promise<ActiveActor> => {
    const one = await makePerson(db, registry.clock.now(), roles, { passwordHash, name: name ?? `${NAMES[made % NAMES.length]} Wexcombe-${NAMES[Math.floor(made / NAMES.length) % NAMES.length]}${made}` })
    made++
    const [sessionId] = await db('user_sessions').insert({
      uid: randomUUID(), user_id: one.userId, created_at: sqlTime(registry.clock.now()), last_seen_at: sqlTime(registry.clock.now()), expires_at: '2030-01-01 00:00:00.000',
    })
    return { userId: one.userId, uid: one.uid, name: one.name, email: one.email, roles: [...new Set<Role>(['entrant', ...roles])], sessionId: sessionId!, secondFactor: true }
  }
  const accredit = async (measurer: ActiveActor) => {
    const species = await db('species').whereIn('code', ['mule-deer', 'black-bear']).pluck('id') as number[]
    const [id] = await db('accreditations').insert({ uid: randomUUID(), user_id: measurer.userId, number: `M-${measurer.userId}`, valid_from: '2020-01-01', valid_to: '2029-12-31', created_at: '2020-01-01 00:00:00.000' })
    await db('accreditation_species').insert(species.map(one => ({ accreditation_id: id!, species_id: one })))
    return measurer
  }
  const judges: ActiveActor[] = []
  for (let n = 0; n < 7; n++) judges.push(await person(['judge']))
  const cast: Cast = {
    entrant: await person([]), other: await person([]), shop: await person(['shop']),
    measurer: await accredit(await person(['measurer'])), measurer2: await accredit(await person(['measurer'])),
    reviewer: await person(['reviewer']), reviewer2: await person(['reviewer']), registrar: await person(['registrar']), judges,
  }
  const idOf = async (uid: string) => (await db('entries').where({ uid }).first('id'))!.id
  const version = async (uid: string) => (await db('entries').where({ uid }).first('version'))!.version
  const state = async (uid: string) => (await db('entries').where({ uid }).first('state'))!.state
  const move: Scene['move'] = async (actor, uid, input) => moveEntry(registry, actor, uid, { version: await version(uid), ...input })

  const scene: Scene = {
    cast, person, state, version, move,
    async papers(uid, kinds) {
      const entryId = await idOf(uid)
      for (const kind of kinds) {
        const sha256 = createHash('sha256').update(`${uid}${kind}`).digest('hex')
        const [file] = await db('files').insert({ sha256, size: 1, mime: 'image/jpeg', storage_key: `t/${sha256}`, created_at: sqlTime(registry.clock.now()) })
        await db('documents').insert({ uid: randomUUID(), entry_id: entryId, file_id: file!, kind, name: kind, created_at: sqlTime(registry.clock.now()) })
      }
    },
    async statement(uid, part = 'hunter') {
      await db('statements').insert({ uid: randomUUID(), entry_id: await idOf(uid), text_version: 1, part, signer_name: cast.entrant.name, user_id: cast.entrant.userId, body_hash: 'a'.repeat(64), signed_at: sqlTime(registry.clock.now()) })
    },
    async pay(uid, amount = 4000) {
      await db('ledger').insert({ uid: randomUUID(), entry_id: await idOf(uid), kind: 'charge', amount_minor: amount, currency: 'USD', provider_id: randomUUID(), at: sqlTime(registry.clock.now()) })
    },
    async tickAll(uid, reviewer = cast.reviewer) {
      for (const code of checksFor('hunted', false)) await setCheck(registry, reviewer, uid, code, true)
    },
    async measure(uid, measurements = DEER, more = {}) {
      const measurer = await db('entries as e').join('users as u', 'u.id', 'e.measurer_user_id').where('e.uid', uid).first('u.uid')
      const actor = [cast.measurer, cast.measurer2].find(one => one.uid === measurer!.uid)!
      const sheet = await db('sheets').where({ entry_id: await idOf(uid), kind: 'entry', state: 'open' }).first('version')
      await saveSheet(registry, actor, uid, sheet!.version, { measurements: measurements as Record<string, unknown>, measuredOn: '2026-02-20', driedSince: '2025-11-15', driedFrom: 'taken', wholeSkull: true, ...more }, 'en')
    },
    async entry(stage, wishes = {}) {
      const { uid } = await createEntry(registry, cast.entrant, {
        category: wishes.category ?? 'mule-deer-typical', origin: 'hunted', takenOn: wishes.takenOn ?? '2025-11-14', district: DISTRICT.code, method: 'rifle', sex: 'male', guided: false,
        people: (wishes.people ?? [{ part: 'hunter', name: cast.entrant.name, isMinor: false, isMe: true }]) as never,
      })
      const steps: Record<Exclude<Stage, 'draft'>, () => Promise<unknown>> = {
        measuring: () => move(cast.entrant, uid, { transition: 'ask_measurer', measurer: cast.measurer.uid }),
        certified: async () => {
          await scene.measure(uid, wishes.measurements ?? DEER)
          await move(cast.measurer, uid, { transition: 'certify', password: PASSWORD })
        },
        in_review: async () => {
          await scene.papers(uid, PAPERS.hunted)
          await scene.statement(uid)
          await scene.pay(uid)
          await move(cast.entrant, uid, { transition: 'submit' })
        },
        at_panel: async () => {
          await scene.tickAll(uid)
          await move(cast.reviewer, uid, { transition: 'put_before_panel', ...(wishes.sitting ? { sitting: wishes.sitting } : {}) })
        },
        accepted: async () => {
          const sitting = await scene.sitting(true)
          await db('docket_items').where({ entry_id: await idOf(uid), state: 'open' }).update({ sitting_id: (await db('sittings').where({ uid: sitting }).first('id'))!.id, second_measuring_due: 0 })
          await scene.vote(uid, ['accept', 'accept', 'accept'])
          await scene.close(sitting)
        },
      }
      for (const step of STAGES.slice(1, STAGES.indexOf(stage) + 1)) await steps[step as Exclude<Stage, 'draft'>]()
      return uid
    },
    async sitting(open = false, named = cast.judges) {
      const uid = await planSitting(registry, cast.reviewer, { heldOn: '2027-01-01', place: 'Town hall', chair: named[0]!.uid, judges: named.map(judge => judge.uid), items: [] })
      if (open) await openSitting(registry, named[0]!, uid)
      return uid
    },
    async itemOf(uid) {
      const item = await db('docket_items as d').leftJoin('sittings as s', 's.id', 'd.sitting_id').where('d.entry_id', await idOf(uid)).orderBy('d.id', 'desc')
        .first('d.uid', 'd.state', 'd.outcome', 's.uid as sitting', 'd.second_measuring_due as second', 'd.reason')
      return item!
    },
    async vote(uid, votes, judges = cast.judges) {
      const item = await scene.itemOf(uid)
      for (const [place, vote] of votes.entries()) {
        const ballot = typeof vote === 'string' ? { vote, ...(vote === 'accept' ? {} : { reason: `Because of ${vote}` }), ...(vote === 'decline' || vote === 'strike' ? { ground: 'altered_parts' as const } : {}) } : vote
        await castBallot(registry, judges[place]!, item.sitting!, item.uid, ballot)
      }
    },
    close: sitting => closeSitting(registry, cast.judges[0]!, sitting),
  }
  return scene
}

export { askRequest, answerRequest }

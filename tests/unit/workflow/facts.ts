import type { ActiveActor, Role } from '../../../shared/domain/access/roles'
import type { StakeFacts } from '../../../shared/domain/access/stakes'
import type { ActInput, EntryFacts, Performer } from '../../../shared/domain/workflow/facts'
import { DEFAULT_LIMITS } from '../../../shared/domain/workflow/limits'
import { runGuards, type GuardContext, type GuardName } from '../../../shared/domain/workflow/guards'
import type { Party } from '../../../shared/domain/workflow/rows'
import type { Surroundings } from '../../../shared/domain/workflow/transition'

export const TODAY = '2026-03-02'
export const AROUND: Surroundings = { today: TODAY, limits: DEFAULT_LIMITS }

export const IDS = { owner: 1, measurer: 2, reviewer: 3, chair: 4, judgeA: 5, judgeB: 6, registrar: 7, shop: 8, stranger: 9 } as const

export function actor(userId: number, roles: readonly Role[] = []): ActiveActor {
  return { userId, uid: `uid-${userId}`, name: `Person ${userId}`, email: `p${userId}@ochrebasin.example`, roles: ['entrant', ...roles], sessionId: userId, secondFactor: true }
}

export function person(userId: number, roles: readonly Role[] = [], keys: { nameKey?: string, addressKey?: string | null } = {}): Performer {
  return { kind: 'person', actor: actor(userId, roles), keys: { userId, nameKey: `person ${userId}`, addressKey: null, ...keys } }
}

/** One performer for each party, nobody else's. */
export const PERFORMERS: Readonly<Record<Party, Performer>> = {
  entrant: person(IDS.owner),
  shop: person(IDS.shop, ['shop']),
  measurer: person(IDS.stranger, ['measurer']),
  assigned_measurer: person(IDS.measurer, ['measurer']),
  reviewer: person(IDS.reviewer, ['reviewer']),
  chair: person(IDS.chair, ['judge']),
  judge_pair: person(IDS.judgeA, ['judge']),
  panel: { kind: 'panel' },
  registrar: person(IDS.registrar, ['registrar']),
  clock: { kind: 'clock' },
  system: { kind: 'system' },
}

export const STAKELESS: StakeFacts = {
  ownerUserId: IDS.owner, people: [{ part: 'hunter', userId: IDS.owner, nameKey: 'person 1', addressKey: null }],
  measuredBy: [], declaredBy: [], reportedBy: [], clearances: [], matter: 'entry', decidedBy: [],
}

/** An entry about which nothing stands in the way of anything, as far as one entry can be so. */
export const FACTS: EntryFacts = {
  state: 'draft', returnTo: null, dueOn: null, ownerUserId: IDS.owner, measurerUserId: IDS.measurer, chairUserIds: [IDS.chair], onHold: false,
  species: 'mule-deer',
  animal: { origin: 'hunted', districtKnown: true, takenPrecision: 'day', method: 'rifle', sex: 'male', guided: false, people: [{ part: 'hunter', minor: false, died: false }] },
  classLine: 'allowed', stakes: STAKELESS, hasReadings: false,
  sheet: { ofClass: true, missing: [], blockingSlips: [], driedSince: '2025-12-01', measuredOn: '2026-03-01' },
  accreditations: [{ validFrom: '2025-01-01', validTo: '2027-12-31', suspendedOn: null, species: ['mule-deer'] }],
  missingPapers: [], statementBy: ['hunter'], fee: { due: 4000, settled: 4000, waived: false }, spreadCounts: true,
  net16: 2736, minimum16: 2528, openRequests: 0, unansweredRequests: 0, uncheckedCodes: [], likelyDoubles: 0, revived: false, appealed: false,
  second: { due: true, done: true, askedBy: 0, pair: [IDS.judgeA, IDS.judgeB], pairStakes: [], pairOpened: 0, day: '2026-03-01', jointSignatures: 2, notPresented: false },
  decision: null, reportChecked: true, challengeAnswered: true, otherOpenEntry: false, otherRecord: false, actedOnSince: false, withdrawalAsked: false,
}

export const CANDIDATE = { userId: IDS.measurer, accreditations: FACTS.accreditations, stakes: [] }

/** Everything that any transition asks of a request. */
export const INPUT: Omit<ActInput, 'transition'> = {
  comment: 'Because.', confirm: true, place: 'Town hall', onDay: '2026-03-20', ground: 'altered_parts', reason: 'Filled.', text: 'Please.',
  changes: ['hunterName'], passwordVerified: true, candidate: CANDIDATE,
  otherClass: { sameLines: true, consented: true, net16: 2736, minimum16: 2528, feeDue: 4000 },
}

export function context(change: { facts?: Partial<EntryFacts>, input?: Partial<ActInput>, performer?: Performer, parties?: readonly Party[], today?: string } = {}): GuardContext {
  return {
    facts: { ...FACTS, ...change.facts }, input: { transition: 'x', ...INPUT, ...change.input }, performer: change.performer ?? PERFORMERS.entrant,
    parties: new Set(change.parties ?? ['entrant']), to: null, today: change.today ?? TODAY, limits: DEFAULT_LIMITS,
  }
}

/** What one guard says; an empty list when it passes. */
export const guard = (name: GuardName, change: Parameters<typeof context>[0] = {}) => runGuards([name], context(change))

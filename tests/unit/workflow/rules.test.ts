import { describe, expect, test } from 'vitest'
import * as fc from 'fast-check'
import { NATURES } from '../../../shared/domain/measuring/sheet'
import { CHECK_CODES, checksFor, isCheckCode } from '../../../shared/domain/workflow/checks'
import { askClassLine, groundFits, GROUNDS, isGround, isOnTheLine, type ClassLine } from '../../../shared/domain/workflow/eligibility'
import { DEFAULT_LIMITS } from '../../../shared/domain/workflow/limits'
import { mayHaveMethod, missingFacts, missingPapers, ORIGINS, PAPERS, statementSigners, type AnimalFacts, type PersonOfEntry } from '../../../shared/domain/workflow/origins'
import { isVoteOn, leadingGround, needsGround, needsReason, tally, type Vote } from '../../../shared/domain/workflow/panel'
import { compareSheets, isSecondMeasuringDue, linesBeyond, REMEASURE_LIMITS } from '../../../shared/domain/workflow/remeasuring'
import { reminderDue } from '../../../shared/domain/workflow/reminders'
import type { State } from '../../../shared/domain/workflow/states'

describe('papers by origin', () => {
  test('as the design lists them', () => {
    expect(PAPERS.hunted).toEqual(['photo_front', 'photo_left', 'photo_right', 'photo_field', 'tag_or_licence'])
    for (const origin of ['found', 'road_killed', 'agency'] as const) expect(PAPERS[origin]).toEqual(['photo_front', 'photo_left', 'photo_right', 'proof_of_possession', 'account'])
    expect(PAPERS.inherited).toEqual(['photo_front', 'photo_left', 'photo_right', 'account'])
  })

  test('what is missing, in the order it is asked for; genetic proof on the line', () => {
    expect(missingPapers('inherited', ['account', 'photo_left'], false)).toEqual(['photo_front', 'photo_right'])
    expect(missingPapers('inherited', PAPERS.inherited, true)).toEqual(['genetic_proof'])
    expect(missingPapers('inherited', [...PAPERS.inherited, 'genetic_proof'], true)).toEqual([])
  })
})

describe('facts by origin', () => {
  const hunter: PersonOfEntry = { part: 'hunter', minor: false, died: false }
  const person = (part: PersonOfEntry['part'], change: Partial<PersonOfEntry> = {}): PersonOfEntry => ({ part, minor: false, died: false, ...change })
  const HUNTED: AnimalFacts = { origin: 'hunted', districtKnown: true, takenPrecision: 'day', method: 'rifle', sex: 'male', guided: false, people: [hunter] }

  test('hunted: district, day, method, sex, whether there was a guide, hunter', () => {
    expect(missingFacts(HUNTED)).toEqual([])
    expect(missingFacts({ origin: 'hunted', districtKnown: false, takenPrecision: 'month', method: null, sex: null, guided: null, people: [] })).toEqual(['district', 'takenOn', 'method', 'sex', 'guided', 'hunter'])
    expect(missingFacts({ ...HUNTED, guided: true })).toEqual(['guide'])
    expect(missingFacts({ ...HUNTED, guided: true, people: [hunter, person('guide')] })).toEqual([])
  })

  test.each(['month', 'year', 'unknown'] as const)('a %s is no day', (takenPrecision) => {
    expect(missingFacts({ ...HUNTED, takenPrecision })).toEqual(['takenOn'])
    expect(missingFacts({ ...HUNTED, origin: 'inherited', takenPrecision, people: [person('owner')] })).toEqual([])
  })

  test('found heads ask for the day and the finder, no method and no sex', () => {
    const found = { ...HUNTED, method: null, sex: null, guided: null, people: [person('finder')] }
    for (const origin of ['found', 'road_killed'] as const) {
      expect(missingFacts({ ...found, origin })).toEqual([])
      expect(missingFacts({ ...found, origin, people: [], takenPrecision: 'year' })).toEqual(['takenOn', 'finder'])
    }
  })

  test('from an agency or inherited: an owner or a club', () => {
    for (const origin of ['agency', 'inherited'] as const) {
      expect(missingFacts({ ...HUNTED, origin, people: [] })).toEqual(['owner'])
      expect(missingFacts({ ...HUNTED, origin, people: [person('club')] })).toEqual([])
    }
  })

  test('a minor needs a guardian, a hunter who has died an heir', () => {
    expect(missingFacts({ ...HUNTED, people: [{ ...hunter, minor: true }] })).toEqual(['guardian'])
    expect(missingFacts({ ...HUNTED, people: [{ ...hunter, minor: true }, person('guardian')] })).toEqual([])
    expect(missingFacts({ ...HUNTED, people: [hunter, person('guide', { minor: true })] })).toEqual([])
    expect(missingFacts({ ...HUNTED, people: [{ ...hunter, died: true }] })).toEqual(['heir'])
    expect(missingFacts({ ...HUNTED, people: [{ ...hunter, died: true }, person('heir')] })).toEqual([])
    expect(missingFacts({ ...HUNTED, people: [hunter, person('owner', { died: true })] })).toEqual([])
    expect(missingFacts({ ...HUNTED, origin: 'inherited', people: [{ ...hunter, died: true }, person('owner')] })).toEqual([])
  })

  test('who signs the statement', () => {
    expect(statementSigners({ origin: 'hunted', people: [hunter] })).toEqual(['hunter'])
    expect(statementSigners({ origin: 'hunted', people: [] })).toEqual(['hunter'])
    expect(statementSigners({ origin: 'hunted', people: [{ ...hunter, died: true, minor: true }] })).toEqual(['heir'])
    expect(statementSigners({ origin: 'hunted', people: [{ ...hunter, minor: true }] })).toEqual(['guardian'])
    expect(statementSigners({ origin: 'hunted', people: [hunter, person('owner', { died: true })] })).toEqual(['hunter'])
    expect(statementSigners({ origin: 'found', people: [person('finder')] })).toEqual(['finder'])
    expect(statementSigners({ origin: 'inherited', people: [person('owner')] })).toEqual(['owner', 'club'])
  })

  test('a method belongs to hunted animals, and to inherited ones that were', () => {
    expect(ORIGINS.filter(origin => mayHaveMethod(origin, null))).toEqual(['hunted'])
    expect(mayHaveMethod('inherited', 'hunted')).toBe(true)
    expect(mayHaveMethod('inherited', 'found')).toBe(false)
    expect(mayHaveMethod('found', 'hunted')).toBe(false)
  })

  test('checks of the office', () => {
    expect(checksFor('hunted', false)).toEqual(['sheet', 'photographs', 'tag_or_licence', 'statement', 'people', 'date_and_district', 'method', 'doubles', 'eligibility'])
    expect(checksFor('found', true)).toEqual(['sheet', 'photographs', 'proof_of_possession', 'account', 'statement', 'people', 'date_and_district', 'class_line', 'doubles', 'eligibility'])
    expect(checksFor('inherited', false)).toContain('account')
    expect(checksFor('agency', false)).toEqual(checksFor('road_killed', false))
    expect(ORIGINS.flatMap(origin => checksFor(origin, true)).every(isCheckCode)).toBe(true)
    expect(CHECK_CODES.every(isCheckCode)).toBe(true)
    expect(isCheckCode('mood')).toBe(false)
    expect(isCheckCode(1)).toBe(false)
  })
})

describe('grounds and class lines', () => {
  const facts = { spreadCounts: true, net16: 2528, minimum16: 2528, notPresented: false }
  test('grounds that facts can contradict', () => {
    expect(GROUNDS.filter(ground => !groundFits(ground, { ...facts, spreadCounts: false }))).toEqual(['split_skull', 'under_minimum', 'not_presented'])
    expect(groundFits('split_skull', facts)).toBe(true)
    expect(groundFits('under_minimum', { ...facts, net16: 2527 })).toBe(true)
    expect(groundFits('under_minimum', { ...facts, net16: null })).toBe(false)
    expect(groundFits('under_minimum', { ...facts, net16: 1, minimum16: null })).toBe(false)
    expect(groundFits('not_presented', { ...facts, notPresented: true })).toBe(true)
    expect(GROUNDS.every(isGround)).toBe(true)
    expect(isGround('boring')).toBe(false)
    expect(isGround(undefined)).toBe(false)
  })

  const ask = (lines: readonly ClassLine[], side: string | null = null, offered = true) => askClassLine({ category: 'mule', offered, lines, side })
  const mule = (side = '') => ({ category: 'mule', side })
  const black = (side = '') => ({ category: 'blacktail', side })
  test('which classes an animal of a district belongs to', () => {
    expect(ask([])).toBe('allowed')
    expect(ask([], null, false)).toBe('not_offered')
    expect(ask([black()])).toBe('barred')
    expect(ask([mule(), black()])).toBe('allowed')
    expect(ask([mule('east'), black('west')])).toBe('side_unknown')
    expect(ask([mule('east'), black('west')], 'east')).toBe('allowed')
    expect(ask([mule('east'), black('west')], 'west')).toBe('barred')
    expect(ask([mule('east'), black('west')], 'north')).toBe('side_unknown')
  })

  test('proof is wanted where the answer hangs on a side', () => {
    expect(isOnTheLine({ category: 'mule', lines: [mule('east'), black('west')] })).toBe(true)
    expect(isOnTheLine({ category: 'mule', lines: [mule(), mule('east')] })).toBe(false)
    expect(isOnTheLine({ category: 'mule', lines: [black('west')] })).toBe(false)
    expect(isOnTheLine({ category: 'mule', lines: [] })).toBe(false)
  })
})

describe('the panel', () => {
  test.each<[string, 'entry' | 'record', Vote[], string | null]>([
    ['two voting are no quorum', 'entry', ['accept', 'accept'], null],
    ['who stands aside does not count towards it', 'entry', ['accept', 'accept', 'stand_aside'], null],
    ['three are', 'entry', ['accept', 'accept', 'accept'], 'accept'],
    ['two of three are more than half', 'entry', ['accept', 'decline', 'accept'], 'accept'],
    ['half is not more than half', 'entry', ['accept', 'accept', 'decline', 'decline'], 'return'],
    ['standing aside leaves the half as it is', 'entry', ['decline', 'decline', 'accept', 'stand_aside', 'stand_aside'], 'decline'],
    ['a majority to return', 'entry', ['return', 'return', 'accept'], 'return'],
    ['nothing decided upholds a record', 'record', ['strike', 'strike', 'uphold', 'uphold'], 'uphold'],
    ['more than half strike', 'record', ['strike', 'strike', 'uphold'], 'strike'],
    ['more than half uphold', 'record', ['uphold', 'uphold', 'strike'], 'uphold'],
  ])('%s', (_, matter, votes, outcome) => {
    expect(tally(matter, votes, 3).outcome).toBe(outcome)
  })

  test('says how many voted and how many stood aside', () => {
    expect(tally('entry', ['accept', 'stand_aside', 'decline', 'stand_aside'], 2)).toEqual({ voting: 2, standingAside: 2, outcome: 'return' })
    expect(tally('entry', ['accept', 'accept', 'accept'], 4)).toEqual({ voting: 3, standingAside: 0, outcome: null })
  })

  test('the order of the votes never matters, and accepting always takes more than half', () => {
    fc.assert(fc.property(fc.array(fc.constantFrom<Vote>('accept', 'return', 'decline', 'stand_aside'), { maxLength: 9 }), (votes) => {
      const { outcome } = tally('entry', votes, 3)
      expect(tally('entry', [...votes].reverse(), 3).outcome).toBe(outcome)
      const cast = votes.filter(vote => vote !== 'stand_aside').length
      expect(outcome === 'accept').toBe(cast >= 3 && votes.filter(vote => vote === 'accept').length > cast / 2)
    }))
  })

  test('which votes belong to which matter, and what they need', () => {
    expect(['accept', 'return', 'decline', 'stand_aside', 'uphold', 'strike', 'x'].filter(vote => isVoteOn('entry', vote))).toEqual(['accept', 'return', 'decline', 'stand_aside'])
    expect(['accept', 'return', 'decline', 'stand_aside', 'uphold', 'strike', 'x'].filter(vote => isVoteOn('record', vote))).toEqual(['stand_aside', 'uphold', 'strike'])
    const votes: Vote[] = ['accept', 'return', 'decline', 'stand_aside', 'uphold', 'strike']
    expect(votes.filter(needsReason)).toEqual(['return', 'decline', 'stand_aside', 'uphold', 'strike'])
    expect(votes.filter(needsGround)).toEqual(['decline', 'strike'])
  })

  test('the ground that most name, the first where several share the most', () => {
    expect(leadingGround([])).toBeNull()
    expect(leadingGround([null, null])).toBeNull()
    expect(leadingGround(['a', 'b', 'b'])).toBe('b')
    expect(leadingGround([null, 'a', 'b'])).toBe('a')
  })
})

describe('second measuring', () => {
  const due = (total: number, higher: number, equal: number) => isSecondMeasuringDue({ total, higher, equal }, DEFAULT_LIMITS)
  test('a new best always; a tied best only among the first of a long list', () => {
    expect(due(0, 0, 0)).toBe(true)
    expect(due(19, 0, 0)).toBe(true)
    expect(due(19, 0, 1)).toBe(false)
    expect(due(20, 0, 1)).toBe(true)
  })

  test('among the first five, from twenty records on', () => {
    expect(due(20, 4, 0)).toBe(true)
    expect(due(20, 5, 0)).toBe(false)
    expect(due(19, 1, 0)).toBe(false)
    expect(due(1000, 4, 3)).toBe(true)
  })

  test('limits by kind of line', () => {
    expect(REMEASURE_LIMITS).toEqual({ length: 2, point: 2, spread: 2, circumference: 1, palm: 3, width: 1, count: 0, skull: 1 })
    expect(Object.keys(REMEASURE_LIMITS).sort()).toEqual([...NATURES].sort())
  })

  const EMPTY = { single: {}, right: {}, left: {}, lists: {} }
  const lines = NATURES.map(nature => ({ id: nature, nature, kind: 'credit' }))
  test.each(NATURES)('%s: at the limit and one step over', (nature) => {
    const at = (b: number) => compareSheets(lines, { ...EMPTY, single: { [nature]: 40 } }, { ...EMPTY, single: { [nature]: b } })
    const limit = REMEASURE_LIMITS[nature]
    expect(at(40 + limit)).toEqual([{ line: nature, side: 'single', place: null, a: 40, b: 40 + limit, apart: limit, beyond: false }])
    expect(at(40 - limit)[0]!.beyond).toBe(false)
    expect(at(40 + limit + 1)[0]).toMatchObject({ apart: limit + 1, beyond: true })
    expect(at(40 - limit - 1)[0]!.beyond).toBe(true)
  })

  test('a line that one has and the other lacks is beyond every limit; one that both lack is none', () => {
    const one = [{ id: 'g4', nature: 'length' as const, kind: 'paired' }]
    const side = (right: object) => ({ ...EMPTY, right: right as Record<string, number> })
    expect(compareSheets(one, side({ g4: 10 }), side({}))).toEqual([{ line: 'g4', side: 'right', place: null, a: 10, b: null, apart: null, beyond: true }])
    expect(compareSheets(one, side({ g4: 'absent' }), side({ g4: 1 }))[0]).toMatchObject({ apart: null, beyond: true })
    expect(compareSheets(one, side({ g4: 'absent' }), side({ g4: 'absent' }))[0]).toMatchObject({ apart: 0, beyond: false })
    expect(compareSheets(one, EMPTY, EMPTY)).toEqual([])
  })

  test('points of a list lie beside each other longest first, side by side', () => {
    const list = [{ id: 'abnormalPoints', nature: 'point' as const, kind: 'deductedList' }]
    const of = (...points: [side: 'right' | 'left', length: number][]) => ({ ...EMPTY, lists: { abnormalPoints: points.map(([side, length]) => ({ side, length })) } })
    const compared = compareSheets(list, of(['left', 9], ['left', 20], ['right', 5]), of(['left', 19], ['left', 12]))
    expect(compared.map(({ side, place, a, b, beyond }) => [side, place, a, b, beyond])).toEqual([['right', 0, 5, null, true], ['left', 0, 20, 19, false], ['left', 1, 9, 12, true]])
    expect(linesBeyond(compared)).toHaveLength(2)
    expect(compareSheets([{ ...list[0]!, kind: 'addedList' }], of(['left', 9]), EMPTY)).toHaveLength(1)
  })
})

describe('reminders', () => {
  const due = (state: State, dueOn: string, today: string, appealed = false) => reminderDue({ state, dueOn, appealed }, today, DEFAULT_LIMITS)
  test('14 and 75 days untouched, and what was missed is made up', () => {
    const at = (today: string) => due('returned', '2026-05-31', today)
    expect(at('2026-03-15')).toBeNull()
    expect(at('2026-03-16')).toEqual({ reminder: 'untouched_returned', day: 14 })
    expect(at('2026-05-15')).toEqual({ reminder: 'untouched_returned', day: 14 })
    expect(at('2026-05-16')).toEqual({ reminder: 'untouched_returned', day: 75 })
    expect(at('2026-05-31')).toEqual({ reminder: 'untouched_returned', day: 75 })
    expect(at('2026-06-01')).toBeNull()
    expect(due('certified', '2026-05-31', '2026-03-16')).toEqual({ reminder: 'untouched_certified', day: 14 })
  })

  test('seven days before the appeal ends, not once it was made', () => {
    expect(due('declined', '2026-04-01', '2026-03-24')).toBeNull()
    expect(due('declined', '2026-04-01', '2026-03-25')).toEqual({ reminder: 'appeal_ends', day: 7 })
    expect(due('declined', '2026-04-01', '2026-03-25', true)).toBeNull()
    expect(due('declined', '2026-04-01', '2026-04-02')).toBeNull()
  })

  test('no other state has one', () => {
    expect(due('challenged', '2026-05-31', '2026-05-20')).toBeNull()
  })
})

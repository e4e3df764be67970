import { describe, expect, test } from 'vitest'
import type { Stake } from '../../../shared/domain/access/stakes'
import { AMENDABLE_FACTS, GUARDS, INPUT_GUARDS, isGuard, PROTECTED_GUARDS } from '../../../shared/domain/workflow/guards'
import type { Vote } from '../../../shared/domain/workflow/panel'
import { CANDIDATE, FACTS, guard, IDS, PERFORMERS, person, STAKELESS } from './facts'

const passes = (answer: readonly unknown[]) => expect(answer).toEqual([])
const decide = (votes: readonly Vote[], more: object = {}) => ({ decision: { votes, ground: 'altered_parts', reason: 'Filled.', requests: ['One'], ...more } as never })

test('every name is a guard and nothing else is', () => {
  expect(GUARDS.every(isGuard)).toBe(true)
  expect(isGuard('no_such_guard')).toBe(false)
  expect(isGuard(7)).toBe(false)
  expect(new Set(GUARDS).size).toBe(GUARDS.length)
  expect([...PROTECTED_GUARDS, ...INPUT_GUARDS].every(isGuard)).toBe(true)
})

describe('asking a measurer', () => {
  test('animal facts are complete or named', () => {
    passes(guard('animal_facts_complete'))
    expect(guard('animal_facts_complete', { facts: { animal: { ...FACTS.animal, sex: null, districtKnown: false } } })).toEqual([{ guard: 'animal_facts_complete', items: ['district', 'sex'] }])
  })

  test('the class line allows the class', () => {
    passes(guard('class_allowed'))
    expect(guard('class_allowed', { facts: { classLine: 'side_unknown' } })).toEqual([{ guard: 'class_allowed', items: ['side_unknown'] }])
  })

  const accredited = (change: object) => ({ input: { candidate: { ...CANDIDATE, accreditations: [{ ...CANDIDATE.accreditations[0]!, ...change }] } } })
  test.each([
    ['from its first day', { validFrom: '2026-03-02' }, true],
    ['not the day before', { validFrom: '2026-03-03' }, false],
    ['until its last day', { validTo: '2026-03-02' }, true],
    ['not the day after', { validTo: '2026-03-01' }, false],
    ['not from the day of suspension', { suspendedOn: '2026-03-02' }, false],
    ['the day before suspension', { suspendedOn: '2026-03-03' }, true],
    ['not for another species', { species: ['elk'] }, false],
  ])('accredited %s', (_, change, fits) => {
    expect(guard('measurer_fit', accredited(change))).toEqual(fits ? [] : [{ guard: 'measurer_fit' }])
  })

  test('a measurer has to be named, and be without a stake', () => {
    expect(guard('measurer_fit', { input: { candidate: null } })).toHaveLength(1)
    expect(guard('measurer_fit', { input: { candidate: { ...CANDIDATE, accreditations: [] } } })).toHaveLength(1)
    passes(guard('measurer_without_stake'))
    passes(guard('measurer_without_stake', { input: { candidate: null } }))
    const stakes: Stake[] = [{ kind: 'owner' }, { kind: 'same_name', part: 'hunter' }]
    expect(guard('measurer_without_stake', { input: { candidate: { ...CANDIDATE, stakes } } })).toEqual([{ guard: 'measurer_without_stake', items: ['owner', 'same_name'] }])
  })

  test('a walk-in goes to the measurer\'s own bench only, by the same conditions', () => {
    const own = person(IDS.measurer, ['measurer'])
    passes(guard('walk_in_measurable', { input: { candidate: null }, performer: own }))
    passes(guard('walk_in_measurable', { performer: own }))
    expect(guard('walk_in_measurable', { performer: person(IDS.stranger, ['measurer']) })).toEqual([{ guard: 'walk_in_measurable' }])
    expect(guard('walk_in_measurable', { performer: PERFORMERS.system })).toEqual([{ guard: 'walk_in_measurable' }])
    expect(guard('walk_in_measurable', { performer: own, facts: { classLine: 'barred' }, input: { candidate: { ...CANDIDATE, accreditations: [], stakes: [{ kind: 'owner' }] } } }).map(one => one.guard))
      .toEqual(['class_allowed', 'measurer_fit', 'measurer_without_stake'])
  })

  test('the entrant changes the measurer only before a reading; a registrar may after', () => {
    passes(guard('no_readings_yet'))
    expect(guard('no_readings_yet', { facts: { hasReadings: true } })).toHaveLength(1)
    passes(guard('no_readings_yet', { facts: { hasReadings: true }, performer: PERFORMERS.registrar }))
    expect(guard('no_readings_yet', { facts: { hasReadings: true }, performer: person(IDS.owner, ['registrar']) })).toHaveLength(1)
    expect(guard('no_readings_yet', { facts: { hasReadings: true }, performer: PERFORMERS.system })).toHaveLength(1)
  })
})

describe('certifying', () => {
  const sheet = (change: object) => ({ facts: { sheet: { ...FACTS.sheet!, ...change } } })
  test('there is a sheet, complete and of the class, without a blocking slip', () => {
    passes(guard('sheet_complete'))
    expect(guard('sheet_complete', { facts: { sheet: null } })).toEqual([{ guard: 'sheet_complete', items: ['sheet'] }])
    expect(guard('sheet_complete', sheet({ missing: ['right.g2'] }))).toEqual([{ guard: 'sheet_complete', items: ['right.g2'] }])
    passes(guard('sheet_of_class'))
    expect(guard('sheet_of_class', sheet({ ofClass: false }))).toHaveLength(1)
    expect(guard('sheet_of_class', { facts: { sheet: null } })).toHaveLength(1)
    passes(guard('no_blocking_slip'))
    passes(guard('no_blocking_slip', { facts: { sheet: null } }))
    expect(guard('no_blocking_slip', sheet({ blockingSlips: ['whole_skull'] }))).toEqual([{ guard: 'no_blocking_slip', items: ['whole_skull'] }])
  })

  test('day 60 is the first; nothing is measured tomorrow', () => {
    passes(guard('dried_long_enough', sheet({ driedSince: '2025-12-31', measuredOn: '2026-03-01' })))
    expect(guard('dried_long_enough', sheet({ driedSince: '2026-01-01', measuredOn: '2026-03-01' }))).toEqual([{ guard: 'dried_long_enough', params: { first: '2026-03-02' } }])
    passes(guard('dried_long_enough', sheet({ measuredOn: '2026-03-02' })))
    expect(guard('dried_long_enough', sheet({ measuredOn: '2026-03-03' }))).toHaveLength(1)
    expect(guard('dried_long_enough', sheet({ measuredOn: null }))).toHaveLength(1)
    expect(guard('dried_long_enough', sheet({ driedSince: null }))).toEqual([{ guard: 'dried_long_enough', items: ['driedSince'] }])
    expect(guard('dried_long_enough', { facts: { sheet: null } })).toEqual([{ guard: 'dried_long_enough', items: ['driedSince'] }])
  })

  test('accredited on the day of measuring, not of signing', () => {
    passes(guard('accredited_when_measured'))
    passes(guard('accredited_when_measured', { facts: { accreditations: [{ ...FACTS.accreditations[0]!, validTo: '2026-03-01' }] } }))
    expect(guard('accredited_when_measured', { facts: { accreditations: [{ ...FACTS.accreditations[0]!, validTo: '2026-02-28' }] } })).toHaveLength(1)
    expect(guard('accredited_when_measured', { facts: { sheet: null } })).toHaveLength(1)
    expect(guard('accredited_when_measured', sheet({ measuredOn: null }))).toHaveLength(1)
  })

  test('the password was verified', () => {
    passes(guard('signed_by_password'))
    expect(guard('signed_by_password', { input: { passwordVerified: undefined } })).toHaveLength(1)
    expect(guard('signed_by_password', { input: { passwordVerified: false } })).toHaveLength(1)
  })
})

describe('stakes of whoever acts', () => {
  const hunter = { ...STAKELESS, people: [{ part: 'hunter' as const, userId: IDS.reviewer, nameKey: 'x', addressKey: null }] }
  test('a stake bars, and is named', () => {
    passes(guard('no_stake', { performer: PERFORMERS.reviewer, parties: ['reviewer'] }))
    expect(guard('no_stake', { performer: PERFORMERS.reviewer, parties: ['reviewer'], facts: { stakes: hunter } })).toEqual([{ guard: 'no_stake', items: ['part.hunter'] }])
    expect(guard('no_stake', { performer: PERFORMERS.reviewer, parties: ['reviewer'], facts: { stakes: { ...STAKELESS, measuredBy: [IDS.reviewer] } } })).toEqual([{ guard: 'no_stake', items: ['measured'] }])
  })

  test('the panel, the clock and the system have none', () => {
    for (const party of ['panel', 'clock', 'system'] as const) passes(guard('no_stake', { performer: PERFORMERS[party], parties: [party], facts: { stakes: hunter } }))
  })

  test('the owner acts for their own entry', () => {
    passes(guard('no_stake', { performer: person(IDS.owner, ['judge']), parties: ['entrant', 'chair'] }))
    expect(guard('no_stake', { performer: person(IDS.owner, ['judge']), parties: ['chair'] })).toHaveLength(1)
  })

  test('each right bars by its own act: whoever measured may certify again and nothing else', () => {
    const measured = { stakes: { ...STAKELESS, measuredBy: [IDS.measurer] } }
    passes(guard('no_stake', { performer: PERFORMERS.assigned_measurer, parties: ['assigned_measurer'], facts: measured }))
    for (const party of ['reviewer', 'chair', 'judge_pair', 'registrar'] as const) {
      expect(guard('no_stake', { performer: PERFORMERS.assigned_measurer, parties: [party], facts: measured })).toHaveLength(1)
    }
    const decided = { stakes: { ...STAKELESS, matter: 'challenge' as const, decidedBy: [IDS.chair] } }
    expect(guard('no_stake', { performer: PERFORMERS.chair, parties: ['chair'], facts: decided })).toHaveLength(1)
    passes(guard('no_stake', { performer: PERFORMERS.chair, parties: ['registrar'], facts: decided }))
    passes(guard('no_stake', { performer: PERFORMERS.chair, parties: ['chair', 'registrar'], facts: decided }))
  })
})

describe('submitting', () => {
  test('papers, statement, fee', () => {
    passes(guard('papers_complete'))
    expect(guard('papers_complete', { facts: { missingPapers: ['photo_left'] } })).toEqual([{ guard: 'papers_complete', items: ['photo_left'] }])
    passes(guard('statement_signed'))
    expect(guard('statement_signed', { facts: { statementBy: ['owner'] } })).toEqual([{ guard: 'statement_signed', items: ['hunter'] }])
    passes(guard('fee_settled', { facts: { fee: { due: 4000, settled: 4001, waived: false } } }))
    expect(guard('fee_settled', { facts: { fee: { due: 4000, settled: 3999, waived: false } } })).toEqual([{ guard: 'fee_settled', params: { due: 4000, settled: 3999 } }])
    passes(guard('fee_settled', { facts: { fee: { due: 4000, settled: 0, waived: true } } }))
  })

  test.each(['net_at_minimum', 'standing_net_at_minimum'] as const)('%s: the minimum itself is enough', (name) => {
    passes(guard(name, { facts: { net16: 2528 } }))
    expect(guard(name, { facts: { net16: 2527 } })).toEqual([{ guard: name, params: { net16: 2527, minimum16: 2528 } }])
    expect(guard(name, { facts: { net16: null } })).toEqual([{ guard: name, params: { net16: 0, minimum16: 2528 } }])
    passes(guard(name, { facts: { net16: null, minimum16: null } }))
  })
})

describe('the office', () => {
  test('requests', () => {
    expect(guard('open_request')).toHaveLength(1)
    passes(guard('open_request', { facts: { openRequests: 1 } }))
    passes(guard('every_request_answered'))
    expect(guard('every_request_answered', { facts: { unansweredRequests: 1 } })).toEqual([{ guard: 'every_request_answered', params: { count: 1 } }])
    passes(guard('no_open_request'))
    expect(guard('no_open_request', { facts: { openRequests: 2 } })).toEqual([{ guard: 'no_open_request', params: { count: 2 } }])
  })

  test('lapse comes after the last day of the term', () => {
    passes(guard('untouched_long_enough', { facts: { dueOn: '2026-03-01' } }))
    expect(guard('untouched_long_enough', { facts: { dueOn: '2026-03-02' } })).toHaveLength(1)
    expect(guard('untouched_long_enough')).toHaveLength(1)
  })

  test('once revived, not again', () => {
    passes(guard('not_revived_before'))
    expect(guard('not_revived_before', { facts: { revived: true } })).toHaveLength(1)
  })

  test('a new certificate is asked by whose turn it is', () => {
    passes(guard('own_turn', { facts: { state: 'in_review' }, parties: ['reviewer'] }))
    expect(guard('own_turn', { facts: { state: 'in_review' }, parties: ['chair'] })).toHaveLength(1)
    passes(guard('own_turn', { facts: { state: 'at_panel' }, parties: ['chair'] }))
    expect(guard('own_turn', { facts: { state: 'at_panel' }, parties: ['reviewer'] })).toHaveLength(1)
  })

  test('another class: consent, lines, minimum, fee', () => {
    const other = { sameLines: true, consented: true, net16: 2528, minimum16: 2528, feeDue: 4000 }
    for (const name of ['entrant_consents', 'same_lines', 'other_minimum', 'other_fee'] as const) {
      passes(guard(name, { input: { otherClass: other } }))
      expect(guard(name, { input: { otherClass: null } })).toHaveLength(1)
    }
    expect(guard('entrant_consents', { input: { otherClass: { ...other, consented: false } } })).toHaveLength(1)
    expect(guard('same_lines', { input: { otherClass: { ...other, sameLines: false } } })).toHaveLength(1)
    expect(guard('other_minimum', { input: { otherClass: { ...other, net16: 2527 } } })).toEqual([{ guard: 'other_minimum', params: { net16: 2527, minimum16: 2528 } }])
    expect(guard('other_fee', { input: { otherClass: { ...other, feeDue: 4001 } } })).toEqual([{ guard: 'other_fee', params: { due: 4001, settled: 4000 } }])
    expect(guard('other_fee', { input: { otherClass: null } })).toEqual([{ guard: 'other_fee', params: { due: 0, settled: 4000 } }])
    passes(guard('other_fee', { input: { otherClass: { ...other, feeDue: 9000 } }, facts: { fee: { due: 0, settled: 0, waived: true } } }))
  })

  test('checks and doubles', () => {
    passes(guard('every_check_ticked'))
    expect(guard('every_check_ticked', { facts: { uncheckedCodes: ['doubles'] } })).toEqual([{ guard: 'every_check_ticked', items: ['doubles'] }])
    passes(guard('no_likely_double'))
    expect(guard('no_likely_double', { facts: { likelyDoubles: 1 } })).toEqual([{ guard: 'no_likely_double', params: { count: 1 } }])
  })
})

describe('second measuring', () => {
  const second = (change: object) => ({ facts: { second: { ...FACTS.second, ...change } } })
  test('a place and a day that is not over', () => {
    passes(guard('place_and_day', { input: { onDay: '2026-03-02' } }))
    expect(guard('place_and_day', { input: { onDay: '2026-03-01', place: '  ' } })).toEqual([{ guard: 'place_and_day', items: ['place', 'at'] }])
    expect(guard('place_and_day', { input: { onDay: undefined, place: undefined } })).toEqual([{ guard: 'place_and_day', items: ['place', 'at'] }])
  })

  test('called for: due, asked by two judges, or a challenge', () => {
    passes(guard('second_measuring_called_for'))
    expect(guard('second_measuring_called_for', second({ due: false, askedBy: 1 }))).toHaveLength(1)
    passes(guard('second_measuring_called_for', second({ due: false, askedBy: 2 })))
    passes(guard('second_measuring_called_for', { facts: { state: 'challenged', second: { ...FACTS.second, due: false } } }))
  })

  test('the pair is named, without stakes, and has not opened the file', () => {
    passes(guard('pair_named'))
    expect(guard('pair_named', second({ pair: null }))).toEqual([{ guard: 'pair_named', items: ['pair'] }])
    expect(guard('pair_named', second({ pairStakes: [{ kind: 'owner' }], pairOpened: 1 }))).toEqual([{ guard: 'pair_named', items: ['owner', 'opened'] }])
  })

  test('both sign the joint sheet', () => {
    passes(guard('joint_sheet_signed_by_both'))
    expect(guard('joint_sheet_signed_by_both', second({ jointSignatures: 1 }))).toEqual([{ guard: 'joint_sheet_signed_by_both', params: { count: 1 } }])
  })

  test('not presented is said after the day', () => {
    passes(guard('day_has_passed'))
    expect(guard('day_has_passed', second({ day: '2026-03-02' }))).toHaveLength(1)
    expect(guard('day_has_passed', second({ day: null }))).toHaveLength(1)
  })

  test('done where due', () => {
    passes(guard('second_measuring_done'))
    passes(guard('second_measuring_done', second({ due: false, done: false })))
    expect(guard('second_measuring_done', second({ done: false }))).toHaveLength(1)
  })
})

describe('decisions', () => {
  test('a quorum of three voting judges', () => {
    passes(guard('quorum', { facts: decide(['accept', 'accept', 'decline']) }))
    expect(guard('quorum', { facts: decide(['accept', 'accept', 'stand_aside']) })).toEqual([{ guard: 'quorum', params: { voting: 2, quorum: 3 } }])
    expect(guard('quorum')).toEqual([{ guard: 'quorum', params: { voting: 0, quorum: 3 } }])
  })

  test.each([
    ['panel_says_accept', ['accept', 'accept', 'decline'], ['accept', 'decline', 'decline']],
    ['panel_says_return', ['accept', 'accept', 'decline', 'decline'], ['accept', 'accept', 'accept']],
    ['panel_says_decline', ['decline', 'decline', 'accept'], ['decline', 'accept', 'accept']],
    ['panel_says_uphold', ['uphold', 'strike', 'uphold', 'strike'], ['strike', 'strike', 'strike']],
    ['panel_says_strike', ['strike', 'strike', 'uphold'], ['strike', 'uphold', 'uphold']],
  ] as const)('%s', (name, for_, against) => {
    passes(guard(name, { facts: decide(for_) }))
    expect(guard(name, { facts: decide(against) })).toEqual([{ guard: name }])
    expect(guard(name)).toEqual([{ guard: name }])
  })

  test('one live record and entry an animal', () => {
    passes(guard('one_live_record'))
    expect(guard('one_live_record', { facts: { otherRecord: true } })).toHaveLength(1)
    passes(guard('no_other_open_entry'))
    expect(guard('no_other_open_entry', { facts: { otherOpenEntry: true } })).toHaveLength(1)
  })

  test('ground and reason come from a person\'s request, or from the ballots', () => {
    passes(guard('ground_and_reason'))
    expect(guard('ground_and_reason', { input: { ground: undefined, reason: ' ' } })).toEqual([{ guard: 'ground_and_reason', items: ['ground', 'reason'] }])
    const panel = { performer: PERFORMERS.panel, input: { ground: undefined, reason: undefined } }
    passes(guard('ground_and_reason', { ...panel, facts: decide([]) }))
    expect(guard('ground_and_reason', { ...panel, facts: decide([], { ground: null, reason: '' }) })).toEqual([{ guard: 'ground_and_reason', items: ['ground', 'reason'] }])
    expect(guard('ground_and_reason', panel)).toHaveLength(1)
    passes(guard('reason_given', { ...panel, facts: decide([]) }))
    expect(guard('reason_given', panel)).toHaveLength(1)
    expect(guard('reason_given', { input: { reason: '\n' } })).toHaveLength(1)
    passes(guard('requests_named', { facts: decide([]) }))
    expect(guard('requests_named', { facts: decide([], { requests: [] }) })).toHaveLength(1)
    expect(guard('requests_named')).toHaveLength(1)
  })

  test('a ground that the facts contradict does not fit', () => {
    passes(guard('ground_fits'))
    passes(guard('ground_fits', { input: { ground: undefined } }))
    expect(guard('ground_fits', { input: { ground: 'under_minimum' } })).toEqual([{ guard: 'ground_fits', items: ['under_minimum'] }])
    passes(guard('ground_fits', { input: { ground: 'under_minimum' }, facts: { net16: 2527 } }))
    expect(guard('ground_fits', { input: { ground: 'not_presented' } })).toHaveLength(1)
    passes(guard('ground_fits', { input: { ground: 'not_presented' }, facts: { second: { ...FACTS.second, notPresented: true } } }))
    expect(guard('ground_fits', { input: { ground: 'split_skull' }, facts: { spreadCounts: false } })).toHaveLength(1)
    expect(guard('ground_fits', { performer: PERFORMERS.panel, facts: decide([], { ground: 'not_presented' }) })).toHaveLength(1)
  })
})

describe('after a decision', () => {
  test('the appeal is open to the end of its last day, once, with a text', () => {
    passes(guard('within_appeal_days', { facts: { dueOn: '2026-03-02' } }))
    expect(guard('within_appeal_days', { facts: { dueOn: '2026-03-01' } })).toEqual([{ guard: 'within_appeal_days', params: { dueOn: '2026-03-01' } }])
    expect(guard('within_appeal_days')).toEqual([{ guard: 'within_appeal_days', params: { dueOn: '' } }])
    passes(guard('not_appealed_before'))
    expect(guard('not_appealed_before', { facts: { appealed: true } })).toHaveLength(1)
    passes(guard('text_given'))
    expect(guard('text_given', { input: { text: ' ' } })).toEqual([{ guard: 'text_given', items: ['text'] }])
    expect(guard('text_given', { input: { text: undefined } })).toHaveLength(1)
  })

  test('withdrawing: the entrant alone, or during a hold or challenge the chair after the entrant asked', () => {
    passes(guard('confirmed'))
    expect(guard('confirmed', { input: { confirm: undefined } })).toHaveLength(1)
    const free = (parties: readonly ('entrant' | 'chair')[], facts: object = {}) => guard('withdrawal_agreed', { parties, facts })
    passes(free(['entrant']))
    expect(free(['chair'])).toHaveLength(1)
    for (const held of [{ onHold: true }, { state: 'challenged' as const }]) {
      expect(free(['entrant'], { ...held, withdrawalAsked: true })).toHaveLength(1)
      expect(free(['chair'], held)).toHaveLength(1)
      passes(free(['chair'], { ...held, withdrawalAsked: true }))
      expect(free(['chair', 'entrant'], { ...held, withdrawalAsked: true })).toHaveLength(1)
    }
  })

  test('a challenge needs a checked report; striking waits for the answer or the end of its time', () => {
    passes(guard('report_checked'))
    expect(guard('report_checked', { facts: { reportChecked: false } })).toHaveLength(1)
    passes(guard('answered_or_time_over'))
    passes(guard('answered_or_time_over', { facts: { challengeAnswered: false, dueOn: '2026-03-01' } }))
    expect(guard('answered_or_time_over', { facts: { challengeAnswered: false, dueOn: '2026-03-02' } })).toHaveLength(1)
    expect(guard('answered_or_time_over', { facts: { challengeAnswered: false } })).toHaveLength(1)
  })

  test('an amendment changes listed facts, at least one, and nothing else', () => {
    passes(guard('facts_only', { input: { changes: [...AMENDABLE_FACTS] } }))
    expect(AMENDABLE_FACTS).toEqual(['hunterName', 'hunterPrintedAs', 'finderName', 'ownerName', 'guideName', 'takenOn', 'monthPublic', 'district', 'method', 'sex'])
    expect(guard('facts_only', { input: { changes: ['hunterName', 'net16', 'category'] } })).toEqual([{ guard: 'facts_only', items: ['net16', 'category'] }])
    expect(guard('facts_only', { input: { changes: [] } })).toEqual([{ guard: 'facts_only', items: ['changes'] }])
    expect(guard('facts_only', { input: { changes: undefined } })).toEqual([{ guard: 'facts_only', items: ['changes'] }])
  })

  test('holds and imports', () => {
    passes(guard('not_on_hold'))
    expect(guard('not_on_hold', { facts: { onHold: true } })).toHaveLength(1)
    passes(guard('on_hold', { facts: { onHold: true } }))
    expect(guard('on_hold')).toHaveLength(1)
    passes(guard('not_acted_on_since'))
    expect(guard('not_acted_on_since', { facts: { actedOnSince: true } })).toHaveLength(1)
  })
})

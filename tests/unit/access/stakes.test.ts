import { describe, expect, test } from 'vitest'
import { canBeCleared, PARTS, STAKE_ACTS, stakesOf, type StakeFacts } from '../../../shared/domain/access/stakes'

const ME = { userId: 7, nameKey: 'tarnley wren', addressKey: '4 mill rd' }
const NONE: StakeFacts = { ownerUserId: 1, people: [], measuredBy: [], declaredBy: [], reportedBy: [], clearances: [], matter: 'entry', decidedBy: [] }
const someone = { userId: 2, nameKey: 'else someone', addressKey: null }

describe('the same account is barred', () => {
  test.each(STAKE_ACTS)('nobody has a stake in what is not theirs: %s', (act) => {
    expect(stakesOf({ ...NONE, people: [{ part: 'hunter', ...someone }] }, ME, act)).toEqual([])
  })

  test.each(STAKE_ACTS)('the owner: %s', (act) => {
    expect(stakesOf({ ...NONE, ownerUserId: 7 }, ME, act)).toEqual([{ kind: 'owner' }])
  })

  test.each(PARTS)('%s', (part) => {
    const stakes = stakesOf({ ...NONE, people: [{ part, userId: 7, nameKey: 'x', addressKey: null }] }, ME, 'vote')
    expect(stakes).toEqual(part === 'witness' || part === 'club' ? [] : [{ kind: 'part', part }])
  })

  test('whoever measured it for the entry sheet, but for certifying it again', () => {
    const bars = Object.fromEntries(STAKE_ACTS.map(act => [act, stakesOf({ ...NONE, measuredBy: [7] }, ME, act).length > 0]))
    expect(bars).toEqual({ certify: false, review: true, remeasure: true, vote: true, chair: true, amend: true, challenge: true })
    expect(stakesOf({ ...NONE, measuredBy: [7] }, ME, 'vote')).toEqual([{ kind: 'measured' }])
  })

  test('a declared shop, a report', () => {
    expect(stakesOf({ ...NONE, declaredBy: [7] }, ME, 'certify')).toEqual([{ kind: 'declared' }])
    expect(stakesOf({ ...NONE, reportedBy: [7] }, ME, 'vote')).toEqual([{ kind: 'reporter' }])
    expect(stakesOf({ ...NONE, declaredBy: [8], reportedBy: [8], measuredBy: [8] }, ME, 'vote')).toEqual([])
  })

  test('an earlier vote bars from the appeal or challenge of that decision only', () => {
    const bars = (matter: StakeFacts['matter']) => STAKE_ACTS.filter(act => stakesOf({ ...NONE, matter, decidedBy: [7] }, ME, act).length > 0)
    expect(bars('entry')).toEqual([])
    expect(bars('appeal')).toEqual(['review', 'remeasure', 'vote', 'chair', 'challenge'])
    expect(bars('challenge')).toEqual(['review', 'remeasure', 'vote', 'chair', 'challenge'])
    expect(stakesOf({ ...NONE, matter: 'appeal', decidedBy: [7] }, ME, 'vote')).toEqual([{ kind: 'decided_before' }])
    expect(stakesOf({ ...NONE, matter: 'appeal', decidedBy: [8] }, ME, 'vote')).toEqual([])
  })
})

describe('the same name or address needs a word', () => {
  const like = (person: object, clearances: StakeFacts['clearances'] = []) => stakesOf({ ...NONE, people: [{ part: 'guide', ...someone, ...person }], clearances }, ME, 'vote')

  test('name, address, both', () => {
    expect(like({ nameKey: 'tarnley wren' })).toEqual([{ kind: 'same_name', part: 'guide' }])
    expect(like({ addressKey: '4 mill rd' })).toEqual([{ kind: 'same_address', part: 'guide' }])
    expect(like({ nameKey: 'tarnley wren', addressKey: '4 mill rd' })).toHaveLength(2)
  })

  test('nothing is like nothing', () => {
    expect(stakesOf({ ...NONE, people: [{ part: 'guide', userId: null, nameKey: '', addressKey: null }] }, { userId: 7, nameKey: '', addressKey: null }, 'vote')).toEqual([])
  })

  test('one\'s own line in the entry is a part, not a likeness', () => {
    expect(like({ userId: 7, nameKey: 'tarnley wren' })).toEqual([{ kind: 'part', part: 'guide' }])
  })

  test('a word clears the account, the likeness and the key it was given for, and no other', () => {
    const cleared = { userId: 7, kind: 'name' as const, nameKey: 'tarnley wren', addressKey: '4 mill rd' }
    const both = { nameKey: 'tarnley wren', addressKey: '4 mill rd' }
    expect(like(both, [cleared])).toEqual([{ kind: 'same_address', part: 'guide' }])
    expect(like(both, [{ ...cleared, kind: 'address' }])).toEqual([{ kind: 'same_name', part: 'guide' }])
    expect(like(both, [{ ...cleared, userId: 8 }])).toHaveLength(2)
    expect(like({ nameKey: 'tarnley wren' }, [{ ...cleared, nameKey: 'other' }])).toHaveLength(1)
    expect(like({ addressKey: '4 mill rd' }, [{ ...cleared, kind: 'address', addressKey: 'other' }])).toHaveLength(1)
    // Whatever else the two are alike or unlike in.
    expect(like({ nameKey: 'tarnley wren' }, [{ ...cleared, addressKey: 'another' }])).toEqual([])
    expect(like({ addressKey: '4 mill rd' }, [{ ...cleared, kind: 'address', nameKey: 'another' }])).toEqual([])
  })

  test('only a likeness can be cleared', () => {
    expect(canBeCleared({ kind: 'same_name', part: 'hunter' })).toBe(true)
    expect(canBeCleared({ kind: 'same_address', part: 'hunter' })).toBe(true)
    expect(canBeCleared({ kind: 'owner' })).toBe(false)
    expect(canBeCleared({ kind: 'part', part: 'hunter' })).toBe(false)
  })
})

import { describe, expect, test } from 'vitest'
import {
  canPlanSittings, canReadEntry, canReport, canReview, canWriteFacts, canWriteSheet, isAssignedMeasurer, isItsJudge, isKeeper, isOwner, type EntryAccess,
} from '../../../shared/domain/access/abilities'
import { hasAnyRole, hasRole, isRole, isStaffRole, ROLES, type Role } from '../../../shared/domain/access/roles'
import { hasOpenFacts, isListed, isLive, isState, STATES, type State } from '../../../shared/domain/workflow/states'

const who = (userId: number, ...roles: Role[]) => ({ userId, uid: `u${userId}`, name: 'N', email: 'e@x.example', roles, sessionId: 1, secondFactor: true })
const entry = (change: Partial<EntryAccess> = {}): EntryAccess => ({ state: 'draft', ownerUserId: 1, begunByUserId: 1, measurerUserId: 2, judgeUserIds: [3], ...change })
const states = (holds: (state: State) => boolean) => STATES.filter(holds)

describe('roles', () => {
  test('a visitor holds none', () => {
    expect(hasRole(null, 'entrant')).toBe(false)
    expect(hasAnyRole(null, ROLES)).toBe(false)
    expect(hasRole(who(1, 'judge'), 'judge')).toBe(true)
    expect(hasRole(who(1, 'judge'), 'reviewer')).toBe(false)
    expect(hasAnyRole(who(1, 'judge'), ['reviewer', 'judge'])).toBe(true)
    expect(hasAnyRole(who(1, 'judge'), ['reviewer'])).toBe(false)
  })

  test('which are roles, and which decide about other people\'s animals', () => {
    expect(ROLES.every(isRole)).toBe(true)
    expect(isRole('king')).toBe(false)
    expect(isRole(3)).toBe(false)
    expect(ROLES.filter(isStaffRole)).toEqual(['measurer', 'reviewer', 'judge', 'registrar'])
  })
})

describe('states', () => {
  test('which are listed, live, open for facts', () => {
    expect(states(isListed)).toEqual(['accepted', 'challenged'])
    expect(states(isLive)).toEqual(['draft', 'measuring', 'certified', 'in_review', 'returned', 'at_panel', 'remeasuring', 'accepted', 'challenged'])
    expect(states(state => hasOpenFacts(state))).toEqual(['draft', 'measuring', 'certified'])
    expect(states(state => hasOpenFacts(state, 'in_review'))).toEqual([])
    expect(isState('draft')).toBe(true)
    expect(isState('limbo')).toBe(false)
    expect(isState(1)).toBe(false)
  })
})

describe('relations', () => {
  test('owner', () => {
    expect(isOwner(who(1), entry())).toBe(true)
    expect(isOwner(who(2), entry())).toBe(false)
    expect(isOwner(null, entry({ ownerUserId: null }))).toBe(false)
  })

  test('whoever began it for somebody keeps it until it is claimed', () => {
    const begun = entry({ ownerUserId: null, begunByUserId: 5 })
    expect(isKeeper(who(5, 'shop'), begun)).toBe(true)
    expect(isKeeper(who(5, 'measurer'), begun)).toBe(true)
    expect(isKeeper(who(5, 'entrant'), begun)).toBe(false)
    expect(isKeeper(who(6, 'shop'), begun)).toBe(false)
    expect(isKeeper(who(5, 'shop'), entry({ begunByUserId: 5 }))).toBe(false)
    expect(isKeeper(null, entry({ ownerUserId: null, begunByUserId: null }))).toBe(false)
  })

  test('its measurer and its judges, while they are', () => {
    expect(isAssignedMeasurer(who(2, 'measurer'), entry())).toBe(true)
    expect(isAssignedMeasurer(who(2), entry())).toBe(false)
    expect(isAssignedMeasurer(who(3, 'measurer'), entry())).toBe(false)
    expect(isItsJudge(who(3, 'judge'), entry())).toBe(true)
    expect(isItsJudge(who(3), entry())).toBe(false)
    expect(isItsJudge(who(4, 'judge'), entry())).toBe(false)
    expect(isAssignedMeasurer(null, entry())).toBe(false)
    expect(isItsJudge(null, entry())).toBe(false)
  })
})

describe('who may', () => {
  test('see a file', () => {
    for (const state of STATES) {
      expect(canReadEntry(who(1), entry({ state }))).toBe(true)
      expect(canReadEntry(who(2, 'measurer'), entry({ state }))).toBe(true)
      expect(canReadEntry(who(3, 'judge'), entry({ state }))).toBe(true)
      expect(canReadEntry(who(9, 'registrar'), entry({ state }))).toBe(true)
      expect(canReadEntry(who(9, 'entrant', 'shop', 'measurer', 'judge'), entry({ state }))).toBe(false)
      expect(canReadEntry(null, entry({ state }))).toBe(false)
    }
    expect(states(state => canReadEntry(who(9, 'reviewer'), entry({ state })))).toEqual(STATES.filter(state => !['draft', 'measuring'].includes(state)))
    expect(canReadEntry(who(5, 'shop'), entry({ ownerUserId: null, begunByUserId: 5 }))).toBe(true)
  })

  test('write facts', () => {
    expect(states(state => canWriteFacts(who(1), entry({ state })))).toEqual(['draft', 'measuring', 'certified', 'returned'])
    expect(states(state => canWriteFacts(who(5, 'shop'), entry({ state, ownerUserId: null, begunByUserId: 5 })))).toEqual(['draft', 'measuring', 'certified'])
    expect(states(state => canWriteFacts(who(9, 'registrar'), entry({ state })))).toEqual([])
  })

  test('write the sheet', () => {
    expect(states(state => canWriteSheet(who(2, 'measurer'), entry({ state })))).toEqual(['measuring'])
    expect(states(state => canWriteSheet(who(1, 'measurer'), entry({ state })))).toEqual([])
  })

  test('review', () => {
    expect(states(state => canReview(who(9, 'reviewer'), entry({ state })))).toEqual(['in_review'])
    expect(states(state => canReview(who(9, 'registrar'), entry({ state })))).toEqual([])
  })

  test('report a record, not one\'s own', () => {
    expect(states(state => canReport(who(9), entry({ state })))).toEqual(['accepted', 'challenged'])
    expect(states(state => canReport(who(1), entry({ state })))).toEqual([])
    expect(canReport(null, entry({ state: 'accepted', ownerUserId: null }))).toBe(false)
  })

  test('plan sittings', () => {
    expect(ROLES.filter(role => canPlanSittings(who(1, role)))).toEqual(['reviewer', 'registrar'])
    expect(canPlanSittings(null)).toBe(false)
  })
})

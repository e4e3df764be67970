import { beforeAll, describe, expect, it } from 'vitest'
import type { Knex } from 'knex'
import { refusedBy } from '../../db/errors'
import { useDatabase } from '../support/database'
import { aRecord, aRegistry, aSheet, aUser, anAnimal, anEntry, hash, NOW, refusal, SIGNED, type TestRegistry, uid } from './fixtures'

const own = useDatabase()
let db: Knex
let registry: TestRegistry
beforeAll(async () => {
  db = own.db
  registry = await aRegistry(db)
})

const why = (work: Promise<unknown>) => refusal(work, refusedBy)

describe('accounts', () => {
  it('one account an e-mail; an accent makes it another one, and so does nothing else', async () => {
    const tag = uid().slice(0, 8)
    await aUser(db, { email: `victim-${tag}@people.example` })
    expect(await why(aUser(db, { email: `victim-${tag}@people.example` }))).toBe('uq_users_email')
    expect(await why(aUser(db, { email: `vićtim-${tag}@people.example` }))).toBe('accepted')
    expect(await db('users').where({ email: `victim-${tag}@people.example ` })).toHaveLength(0)
  })

  it('a role is held once at a time, and nobody gives himself one', async () => {
    const [user, other] = [await aUser(db), await aUser(db)]
    const role = { user_id: user, role: 'judge' as const, from_at: NOW, granted_by: other }
    const [first] = await db('user_roles').insert(role)
    expect(await why(db('user_roles').insert(role))).toBe('uq_user_roles_held')
    await db('user_roles').where({ id: first }).update({ to_at: NOW })
    expect(await why(db('user_roles').insert(role))).toBe('accepted')
    expect(await why(db('user_roles').insert({ ...role, role: 'registrar', granted_by: user }))).toBe('ck_user_roles_other')
    expect(await why(db('user_roles').insert({ ...role, role: 'king' as 'judge' }))).toBe('ck_user_roles_role')
  })

  it('a staff role is granted by another than who proposed it and who gets it', async () => {
    const [user, one, two] = [await aUser(db), await aUser(db), await aUser(db)]
    const proposal = { uid: uid(), user_id: user, role: 'reviewer' as const, proposed_by: one, proposed_at: NOW }
    const granted = { decision: 'granted' as const, decided_at: NOW }
    expect(await why(db('role_proposals').insert({ ...proposal, proposed_by: user }))).toBe('ck_role_proposals_other')
    expect(await why(db('role_proposals').insert({ ...proposal, ...granted, decided_by: one }))).toBe('ck_role_proposals_second')
    expect(await why(db('role_proposals').insert({ ...proposal, ...granted, decided_by: user }))).toBe('ck_role_proposals_second')
    expect(await why(db('role_proposals').insert(proposal))).toBe('accepted')
    expect(await why(db('role_proposals').insert({ ...proposal, uid: uid() }))).toBe('uq_role_proposals_open')
    expect(await why(db('role_proposals').where({ uid: proposal.uid }).update({ ...granted, decided_by: two }))).toBe('accepted')
  })
})

describe('animals and entries', () => {
  it('an animal has one entry under way and one listed record', async () => {
    const animal = await anAnimal(db, registry)
    const { id } = await anEntry(db, registry, { animal_id: animal })
    expect(await why(anEntry(db, registry, { animal_id: animal }))).toBe('uq_entries_open_animal')
    await db('entries').where({ id }).update({ state: 'withdrawn' })
    const next = await anEntry(db, registry, { animal_id: animal })
    const listed = { state: 'accepted' as const, source: 'taken_over' as const, net16: 10, gross16: 10 }
    await db('entries').where({ id: next.id }).update(listed)
    const third = await anEntry(db, registry, { animal_id: animal })
    expect(await why(db('entries').where({ id: third.id }).update(listed))).toBe('uq_entries_listed_animal')
  })

  it('the live entry that an animal points at is its own', async () => {
    const [mine, other] = [await anEntry(db, registry), await anEntry(db, registry)]
    expect(await why(db('animals').where({ id: mine.animal }).update({ live_entry_id: other.id }))).toBe('fk_animals_live_entry')
    expect(await why(db('animals').where({ id: mine.animal }).update({ live_entry_id: mine.id }))).toBe('accepted')
  })

  it('a state is one that the entry’s version of the workflow has', async () => {
    expect(await why(anEntry(db, registry, { state: 'challenged', source: 'taken_over' }))).toBe('fk_entries_state')
    expect(await why(anEntry(db, registry, { state: 'lost' as 'draft' }))).toBe('ck_entries_state')
  })

  it('nothing is certified without a signed sheet or submitted without a day, a term and a district', async () => {
    expect(await why(anEntry(db, registry, { state: 'certified' }))).toBe('ck_entries_signed')
    const { id } = await anEntry(db, registry)
    const sheet = await aSheet(db, { entry_id: id, ...SIGNED })
    const certified = { state: 'certified' as const, signed_sheet_id: sheet, net16: 2580, gross16: 2640 }
    expect(await why(db('entries').where({ id }).update(certified))).toBe('accepted')
    expect(await why(db('entries').where({ id }).update({ state: 'in_review' }))).toBe('ck_entries_submitted')
    expect(await why(db('entries').where({ id }).update({
      state: 'in_review', submitted_at: NOW, term_id: registry.term, district_id: registry.district,
    }))).toBe('accepted')
  })

  it('the signed sheet is the entry’s own', async () => {
    const [mine, other] = [await anEntry(db, registry), await anEntry(db, registry)]
    const sheet = await aSheet(db, { entry_id: other.id, ...SIGNED })
    expect(await why(db('entries').where({ id: mine.id }).update({ signed_sheet_id: sheet }))).toBe('fk_entries_signed_sheet')
  })

  it.each([
    ['a day that is two days', { taken_precision: 'day', taken_first_on: '2024-10-01', taken_last_on: '2024-10-02' }],
    ['a month cut short', { taken_precision: 'month', taken_first_on: '2024-02-01', taken_last_on: '2024-02-28' }],
    ['a year that begins in spring', { taken_precision: 'year', taken_first_on: '1950-03-01', taken_last_on: '1950-12-31' }],
    ['an unknown date with a first day', { taken_precision: 'unknown', taken_first_on: '1950-01-01', taken_last_on: '2026-01-01' }],
  ] as const)('refuses %s', async (_, taken) => {
    expect(await why(anEntry(db, registry, taken))).toBe('ck_entries_taken')
  })

  it.each([
    { taken_precision: 'day', taken_first_on: '2024-10-01', taken_last_on: '2024-10-01' },
    { taken_precision: 'month', taken_first_on: '2024-02-01', taken_last_on: '2024-02-29' },
    { taken_precision: 'year', taken_first_on: '1931-01-01', taken_last_on: '1931-12-31' },
    { taken_precision: 'unknown', taken_first_on: '1000-01-01', taken_last_on: '2026-01-01' },
  ] as const)('takes a date known to the $taken_precision', async (taken) => {
    expect(await why(anEntry(db, registry, taken))).toBe('accepted')
  })

  it('no net above its gross, no half of a hold, no measuring without a measurer, one hunter an animal', async () => {
    const user = await aUser(db)
    expect(await why(anEntry(db, registry, { net16: 11, gross16: 10 }))).toBe('ck_entries_net')
    expect(await why(anEntry(db, registry, { hold_at: NOW, hold_by: user }))).toBe('ck_entries_hold')
    expect(await why(anEntry(db, registry, { state: 'measuring' }))).toBe('ck_entries_measuring')
    const { id } = await anEntry(db, registry)
    const hunter = { uid: uid(), entry_id: id, part: 'hunter' as const, name: 'Wren Tarnley', name_key: 'tarnley wren', created_at: NOW }
    await db('entry_people').insert(hunter)
    expect(await why(db('entry_people').insert({ ...hunter, uid: uid() }))).toBe('uq_entry_people_single')
    expect(await why(db('entry_people').insert({ ...hunter, uid: uid(), part: 'guide' }))).toBe('accepted')
  })

  it('nobody clears a stake of himself', async () => {
    const user = await aUser(db)
    const { id } = await anEntry(db, registry)
    const [person] = await db('entry_people').insert({ uid: uid(), entry_id: id, part: 'owner', name: 'Ulla Thorn', name_key: 'thorn ulla', created_at: NOW })
    expect(await why(db('stake_clearances').insert({
      entry_id: id, user_id: user, entry_person_id: person!, kind: 'name', reason: 'another family', cleared_by: user, cleared_at: NOW,
    }))).toBe('ck_stake_clearances_other')
  })
})

describe('sheets', () => {
  it('one sheet of a kind is open at a time; a signed one has a hash, a day and a measurer', async () => {
    const { id } = await anEntry(db, registry)
    await aSheet(db, { entry_id: id })
    expect(await why(aSheet(db, { entry_id: id, number: 2 }))).toBe('uq_sheets_open')
    expect(await why(aSheet(db, { entry_id: id, kind: 'panel_a' }))).toBe('accepted')
    expect(await why(aSheet(db, { entry_id: id, number: 3, ...SIGNED, hash: null }))).toBe('ck_sheets_signed')
    expect(await why(aSheet(db, { entry_id: id, number: 3, ...SIGNED, net: 1321 }))).toBe('ck_sheets_net')
    expect(await why(aSheet(db, {}))).toBe('ck_sheets_entry')
    expect(await why(aSheet(db, { kind: 'rough' }))).toBe('accepted')
  })

  it.each([
    { measurements: '{"single":{}}' }, { net: 1289 }, { net16: 2578 }, { gross_all: 1400 }, { hash: hash('another') },
    { signed_at: '2026-03-03 10:00:00.000' }, { state: 'open', signed_at: null, hash: null }, { slip_answers: '{"a":1}' },
    { measured_on: '2026-02-01' }, { definition: 'x@2' }, { dried_since: '2025-01-01' }, { measurer_name: 'abren stonewick' }, { reason: 'because' },
  ])('a signed sheet never changes: %o', async (change) => {
    const { id } = await anEntry(db, registry)
    const sheet = await aSheet(db, { entry_id: id, ...SIGNED })
    expect(await why(db('sheets').where({ id: sheet }).update(change as object))).toBe('signed_sheet_unchanged')
  })

  it('a signed sheet may be marked as replaced, and never removed', async () => {
    const { id } = await anEntry(db, registry)
    const sheet = await aSheet(db, { entry_id: id, ...SIGNED })
    expect(await why(db('sheets').where({ id: sheet }).update({ state: 'replaced' }))).toBe('accepted')
    expect(await why(db('sheets').where({ id: sheet }).update({ state: 'signed' }))).toBe('signed_sheet_unchanged')
    expect(await why(db('sheets').where({ id: sheet }).delete())).toBe('signed_sheet_unchanged')
  })
})

describe('money', () => {
  it('one checkout runs at a time for an entry', async () => {
    const [user, { id }] = [await aUser(db), await anEntry(db, registry)]
    const version = Number.parseInt(uid().slice(0, 6), 16)
    await db('fee_versions').insert({ version, from_on: '2026-01-01', currency: 'USD', created_at: NOW })
    const checkout = { entry_id: id, user_id: user, amount_minor: 4000, currency: 'USD', fee_version: version, created_at: NOW }
    await db('checkouts').insert({ ...checkout, uid: uid() })
    expect(await why(db('checkouts').insert({ ...checkout, uid: uid() }))).toBe('uq_checkouts_running')
    expect(await why(db('checkouts').insert({ ...checkout, uid: uid(), currency: 'EUR', state: 'failed', finished_at: NOW }))).toBe('fk_checkouts_fee')
    expect(await why(db('fees').insert({ version, amount_minor: 1, currency: 'EUR' }))).toBe('fk_fees_version')
    await db('fees').insert({ version, amount_minor: 4000, currency: 'USD' })
    expect(await why(db('fees').insert({ version, amount_minor: 5000, currency: 'USD' }))).toBe('uq_fees_version_class')
  })

  it('a charge is booked once and never changes; a waiver says who and why', async () => {
    const { id } = await anEntry(db, registry)
    const charge = { entry_id: id, kind: 'charge' as const, amount_minor: 4000, currency: 'USD', provider_id: `pi_${uid()}`, at: NOW }
    await db('ledger').insert({ ...charge, uid: uid() })
    expect(await why(db('ledger').insert({ ...charge, uid: uid() }))).toBe('uq_ledger_provider')
    expect(await why(db('ledger').where({ entry_id: id }).update({ amount_minor: 1 }))).toBe('append_only')
    expect(await why(db('ledger').where({ entry_id: id }).delete())).toBe('append_only')
    expect(await why(db('ledger').insert({ entry_id: id, uid: uid(), kind: 'waiver', amount_minor: 0, currency: 'USD', at: NOW }))).toBe('ck_ledger_office')
  })
})

describe('the panel', () => {
  it('an entry stands on one docket, and a judge votes once, with a reason for anything but accepting', async () => {
    const [chair, judge, { id }] = [await aUser(db), await aUser(db), await anEntry(db, registry)]
    const [sitting] = await db('sittings').insert({ uid: uid(), held_on: '2026-03-20', place: 'Brackwater', chair_user_id: chair, created_at: NOW })
    const item = { sitting_id: sitting, entry_id: id, kind: 'entry' as const, created_at: NOW }
    const [docket] = await db('docket_items').insert({ ...item, uid: uid() })
    expect(await why(db('docket_items').insert({ ...item, uid: uid() }))).toBe('uq_docket_items_open')
    expect(await why(db('docket_items').where({ id: docket }).update({ judge_a: judge, judge_b: judge }))).toBe('ck_docket_items_judges')
    expect(await why(db('docket_items').where({ id: docket }).update({ state: 'decided' }))).toBe('ck_docket_items_decided')
    const ballot = { docket_item_id: docket!, judge_user_id: judge, cast_at: NOW }
    expect(await why(db('ballots').insert({ ...ballot, vote: 'decline', reason: '  ' }))).toBe('ck_ballots_reason')
    expect(await why(db('ballots').insert({ ...ballot, vote: 'accept' }))).toBe('accepted')
    expect(await why(db('ballots').insert({ ...ballot, vote: 'decline', reason: 'late' }))).toBe('uq_ballots_judge')
  })
})

describe('events', () => {
  it('are only ever appended, each number once; a text may be erased and nothing else', async () => {
    const { id } = await anEntry(db, registry)
    const event = { entry_id: id, seq: 1, at: NOW, kind: 'begin', args: '{}', commitments: '{}', hash: hash(uid()) }
    const [eventId] = await db('entry_events').insert(event)
    expect(await why(db('entry_events').insert({ ...event, hash: hash(uid()) }))).toBe('uq_entry_events_seq')
    expect(await why(db('entry_events').insert({ ...event, seq: 2, hash: hash(uid()) }))).toBe('ck_entry_events_prev')
    expect(await why(db('entry_events').where({ id: eventId }).update({ args: '{"a":1}' }))).toBe('append_only')
    expect(await why(db('entry_events').where({ id: eventId }).delete())).toBe('append_only')
    await db('event_texts').insert({ event_id: eventId!, field: 'comment', salt: 'ab', body: 'a name' })
    expect(await why(db('event_texts').where({ event_id: eventId }).update({ body: 'another' }))).toBe('append_only')
    expect(await why(db('event_texts').where({ event_id: eventId }).update({ body: null }))).toBe('accepted')
    expect(await why(db('event_texts').where({ event_id: eventId }).delete())).toBe('append_only')
  })
})

describe('records', () => {
  it('a number is given once, an animal stands once, a class is of its species, found animals have no method', async () => {
    const first = await aRecord(db, registry)
    const { record_no } = (await db('records').where({ id: first.id }).first('record_no'))!
    expect(await why(aRecord(db, registry, { record_no }))).toBe('uq_records_record_no')
    const other = await aRegistry(db)
    expect(await why(aRecord(db, registry, { species_id: other.species }))).toBe('fk_records_class')
    expect(await why(aRecord(db, registry, { origin: 'found', method: 'rifle' }))).toBe('ck_records_found_method')
    expect(await why(aRecord(db, registry, { source: 'certified' }))).toBe('ck_records_sheet')
    expect(await why(aRecord(db, registry, { net16: 2641 }))).toBe('ck_records_net')
    const { animal_id } = (await db('records').where({ id: first.id }).first('animal_id'))!
    expect(await why(aRecord(db, registry, { animal_id }))).toMatch(/uq_records_listed_animal|fk_records_entry/)
  })
})

import { beforeAll, describe, expect, it } from 'vitest'
import type { Knex } from 'knex'
import { ROLES, STAFF_ROLES } from '../../shared/domain/access/roles'
import { PARTS } from '../../shared/domain/access/stakes'
import { DATE_PRECISIONS } from '../../shared/domain/dates'
import { PRINTED_AS } from '../../shared/domain/lists'
import { CATEGORIES, currentDefinition, TYPICALITIES } from '../../shared/domain/measuring'
import { DOCUMENT_KINDS, METHODS, ORIGINS, SEXES } from '../../shared/domain/workflow/origins'
import { OUTCOMES, ENTRY_VOTES, RECORD_VOTES } from '../../shared/domain/workflow/panel'
import { STATES, TURNS } from '../../shared/domain/workflow/states'
import { CLASSES } from '../../seeds/reference/classes'
import { SPECIES } from '../../seeds/reference/species'
import { seedReference } from '../../seeds/reference'
import { keepSeeded } from '../../seeds/keep'
import { useEmptyDatabase } from '../support/database'
import { migrateUp } from '../../db/migrate'

const own = useEmptyDatabase()
let db: Knex
const NOW = new Date('2026-03-02T10:00:00Z')
beforeAll(async () => {
  db = own.db
  await migrateUp(db)
  await seedReference(db, NOW)
})

const everything = async () => JSON.stringify([
  await db('species').orderBy('id'), await db('classes').orderBy('id'), await db('settings').orderBy('name'),
  await db('workflow_transitions').orderBy('code'), await db('statement_texts').orderBy('version'), await db('counters').orderBy('name'),
])

describe('reference seeds', () => {
  it('name the 27 classes of the engine, each with its newest definition, step, species and typicality', () => {
    expect(CLASSES.map(seed => seed.code).sort()).toEqual([...CATEGORIES].sort())
    for (const seed of CLASSES) {
      const definition = currentDefinition(seed.code as (typeof CATEGORIES)[number])
      expect({ definition: seed.definition, step: seed.step, species: seed.species, typicality: seed.typicality })
        .toEqual({ definition: definition.id, step: definition.step, species: definition.species, typicality: definition.typicality })
      expect(SPECIES.find(species => species.code === seed.species)!.family).toBe(definition.family)
    }
  })

  it('change nothing when they run again', async () => {
    const before = await everything()
    await seedReference(db, new Date('2027-01-01T00:00:00Z'))
    expect(await everything()).toBe(before)
  })

  it('leave what a registrar edited, and follow a newer seed where nobody did', async () => {
    await db('species').where({ code: 'elk' }).update({ scientific_name: 'Cervus elaphus canadensis' })
    await db('settings').where({ name: 'officeEmail' }).update({ value: '"office@registry.example"' })
    await db('classes').where({ code: 'moose' }).update({ offered: 1 })
    await db('workflow_transitions').where({ code: 'hand_back' }).update({ comment_required: 0 })
    const newer = SPECIES.map((species, place) => ({ ...species, scientific_name: `${species.scientific_name} L.`, sort: place + 1 }))
    expect(await keepSeeded(db, 'species', ['code'], newer)).toEqual({ inserted: 0, updated: SPECIES.length - 1, edited: 1 })
    await seedReference(db, NOW)

    expect((await db('species').where({ code: 'elk' }).first())!.scientific_name).toBe('Cervus elaphus canadensis')
    expect((await db('species').where({ code: 'bison' }).first())!.scientific_name).toBe('Bison bison')
    expect((await db('settings').where({ name: 'officeEmail' }).first())!.value).toBe('"office@registry.example"')
    expect((await db('classes').where({ code: 'moose' }).first())!.offered).toBe(1)
    expect((await db('workflow_transitions').where({ code: 'hand_back' }).first())!.comment_required).toBe(0)
  })

  it('bring back what is missing', async () => {
    await db('settings').where({ name: 'currency' }).delete()
    await seedReference(db, NOW)
    expect(await db('settings').where({ name: 'currency' })).toHaveLength(1)
  })
})

describe('one word for one thing', () => {
  /** The values that a CHECK lets in. */
  async function allowed(constraint: string): Promise<string[]> {
    const row = await db('information_schema.check_constraints').whereRaw('constraint_schema = database()')
      .where('constraint_name', constraint).first('check_clause as clause') as { clause: string } | undefined
    return [...(row?.clause ?? '').matchAll(/'([^']*)'/g)].map(match => match[1]!).sort()
  }

  it.each([
    ['ck_entries_state', STATES],
    ['ck_workflow_states_turn', TURNS],
    ['ck_entries_origin', ORIGINS],
    ['ck_records_origin', ORIGINS],
    ['ck_entries_method', METHODS],
    ['ck_records_method', METHODS],
    ['ck_entries_sex', SEXES],
    ['ck_entries_taken_precision', DATE_PRECISIONS],
    ['ck_entries_hunter_printed_as', PRINTED_AS],
    ['ck_users_print_name', PRINTED_AS],
    ['ck_documents_kind', DOCUMENT_KINDS],
    ['ck_entry_people_part', PARTS],
    ['ck_user_roles_role', ROLES],
    ['ck_role_proposals_role', STAFF_ROLES],
    ['ck_classes_typicality', TYPICALITIES],
  ] as const)('%s holds the vocabulary of the domain', async (constraint, words) => {
    expect(await allowed(constraint)).toEqual([...words].sort())
  })

  it.each([
    ['ck_ballots_vote', [...ENTRY_VOTES, ...RECORD_VOTES]],
    ['ck_docket_items_outcome', OUTCOMES],
  ] as const)('%s holds at least the vocabulary of the domain', async (constraint, words) => {
    expect(await allowed(constraint)).toEqual(expect.arrayContaining([...words]))
  })
})

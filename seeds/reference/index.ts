import type { Knex } from 'knex'
import { sqlTime } from '../../db/time'
import { DEFAULT_LIMITS } from '#shared/domain/workflow/limits'
import { keepSeeded, keepSettings } from '../keep'
import { CLASSES } from './classes'
import { SETTINGS } from './settings'
import { SPECIES } from './species'
import { STATEMENT_TEXTS } from './statement-texts'
import { WORKFLOW_STATES, WORKFLOW_TRANSITIONS, WORKFLOW_VERSION } from './workflow'

/** Counters that hand out numbers; a number is never handed out twice. */
const COUNTERS = ['record_no', 'lists_version'] as const

/**
 * What every registry needs before it can open: species, classes, the statement, settings, counters. Safe to run at
 * every start: it inserts what is missing and leaves alone what somebody edited.
 */
export async function seedReference(db: Knex, now: Date): Promise<void> {
  await keepSeeded(db, 'species', ['code'], SPECIES.map((species, place) => ({ ...species, sort: place + 1 })))
  const ids = new Map((await db('species').select('id', 'code')).map(row => [row.code, row.id]))
  await keepSeeded(db, 'classes', ['code'], CLASSES.map((category, place) => ({
    code: category.code,
    species_id: ids.get(category.species)!,
    definition: category.definition,
    step: category.step,
    typicality: category.typicality,
    sort: place + 1,
  })), { offered: 0 })
  await keepSettings(db, SETTINGS)
  await seedWorkflow(db, now)

  const standing = await db('statement_texts').select('version', 'locale')
  const texts = STATEMENT_TEXTS.filter(text => !standing.some(row => row.version === text.version && row.locale === text.locale))
  if (texts.length > 0) await db('statement_texts').insert(texts.map(text => ({ ...text, created_at: sqlTime(now) })))

  const counting = new Set(await db('counters').pluck('name'))
  const counters = COUNTERS.filter(name => !counting.has(name))
  if (counters.length > 0) await db('counters').insert(counters.map(name => ({ name, value: 0 })))
}

async function seedWorkflow(db: Knex, now: Date): Promise<void> {
  const number = { number: WORKFLOW_VERSION }
  const standing = await db('workflow_versions').where(number).first('id')
  const version = standing?.id
    ?? (await db('workflow_versions').insert({ ...number, created_at: sqlTime(now), limits: JSON.stringify(DEFAULT_LIMITS) }))[0]!
  await keepSeeded(db, 'workflow_states', ['version_id', 'code'], WORKFLOW_STATES.map(state => ({ version_id: version, ...state })))
  await keepSeeded(db, 'workflow_transitions', ['version_id', 'code'], WORKFLOW_TRANSITIONS.map(row => ({
    version_id: version,
    code: row.code,
    from_states: JSON.stringify(row.from),
    to_state: row.to,
    parties: JSON.stringify(row.parties),
    guards: JSON.stringify(row.guards),
    effects: JSON.stringify(row.effects),
    comment_required: row.commentRequired ? 1 : 0,
    sort: row.sort,
  })))
}

import { currentDefinition, formatSteps, fromSixteenths, hasSides, isCategory, lineLabel, type Line } from '#shared/domain/measuring/index'
import type { CategoriesAnswer } from '#shared/schemas/scores'
import { dayIn } from '../../clock'
import type { Registry } from '../../composition'
import { classesInForce } from '../../read-models/classStandings'
import { t } from '../texts/translate'

/** The classes with species, scientific name, the lines of their sheets and the minimum in force. */
export async function listCategories(registry: Registry, locale: string): Promise<CategoriesAnswer> {
  const { timeZone } = await registry.settings()
  const rows = await classesInForce(registry.db, dayIn(timeZone, registry.clock.now()))
  return {
    items: rows.flatMap((row) => {
      if (!isCategory(row.code)) return []
      const definition = currentDefinition(row.code)
      return [{
        category: row.code,
        name: t(locale, `animals.classes.${row.code}`),
        species: row.species,
        speciesName: t(locale, `animals.species.${row.species}`),
        scientificName: row.scientificName,
        typicality: definition.typicality,
        definition: definition.id,
        step: `${definition.step} in` as const,
        offered: row.offered,
        minimum: row.min16 === null ? null : formatSteps(fromSixteenths(row.min16, definition.step), definition.step),
        lines: definition.lines.map(line => presentLine(line, locale)),
      }]
    }),
  }
}

function presentLine(line: Line, locale: string): CategoriesAnswer['items'][number]['lines'][number] {
  return {
    id: line.id,
    label: lineLabel((key, params) => t(locale, key, params), line),
    kind: line.kind,
    sides: hasSides(line),
    difference: (line.kind === 'paired' || line.kind === 'countPair') && line.difference,
    capBy: line.kind === 'credit' ? line.capBy ?? null : null,
  }
}

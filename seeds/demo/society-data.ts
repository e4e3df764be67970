import type { Knex } from 'knex'
import { sqlTime } from '../../db/time'
import { insertMany } from '../bulk'
import { DISTRICTS, type DistrictCode, FEES, FIRST_DAY, NEIGHBOURS, OFFERED, ON_THE_LINE, RANGES, SOCIETY_SETTINGS, TERMS, type DemoClass } from './society'

export interface SocietyIds {
  readonly district: Readonly<Record<DistrictCode, number>>
  readonly species: ReadonlyMap<string, number>
  /** every class, offered or not, by its code */
  readonly category: ReadonlyMap<string, { readonly id: number, readonly speciesId: number, readonly species: string, readonly definition: string, readonly step: '1/8' | '1/16' }>
  readonly terms: readonly { readonly id: number, readonly from: string, readonly to: string | null, readonly share: number }[]
}

/** Minimum of a class in a term, in sixteenths of an inch: a share of the present one, on a step of the sheet. */
export function minimum16(category: DemoClass, share: number, step: '1/8' | '1/16'): number {
  const perStep = step === '1/8' ? 2 : 1
  return Math.round(OFFERED[category].min16 * share / (perStep * (share === 1 ? 1 : 4))) * perStep * (share === 1 ? 1 : 4)
}

/** Districts, what they allow, what is offered, the terms with their minimums, and the fees. */
export async function seedSociety(db: Knex): Promise<SocietyIds> {
  for (const [name, value] of Object.entries(SOCIETY_SETTINGS)) {
    const text = JSON.stringify(value)
    await db('settings').insert({ name, value: text }).onConflict('name').merge({ value: text })
  }
  await insertMany(db, 'districts', DISTRICTS.map((district, place) => ({ ...district, sort: place + 1 })))
  const district = Object.fromEntries((await db('districts').select('id', 'code')).map(row => [row.code, row.id])) as Record<DistrictCode, number>
  await insertMany(db, 'district_neighbours', NEIGHBOURS.flatMap(([one, other]) => [
    { district_id: district[one], neighbour_id: district[other] },
    { district_id: district[other], neighbour_id: district[one] },
  ]))

  const species = new Map((await db('species').select('id', 'code')).map(row => [row.code, row.id]))
  const speciesCode = new Map([...species].map(([code, id]) => [id, code]))
  const classes = await db('classes').select('id', 'code', 'species_id', 'definition', 'step')
  const category = new Map(classes.map(row => [row.code, {
    id: row.id, speciesId: row.species_id, species: speciesCode.get(row.species_id)!, definition: row.definition, step: row.step,
  }]))
  await db('classes').whereIn('code', Object.keys(OFFERED)).update({ offered: 1 })
  await insertMany(db, 'class_lines', classLines(district, category))

  await insertMany(db, 'minimums_terms', TERMS.map(({ label, from_on, to_on }) => ({ label, from_on, to_on })))
  const termRows = await db('minimums_terms').orderBy('from_on').select('id', 'from_on', 'to_on')
  const terms = termRows.map((row, place) => ({ id: row.id, from: row.from_on, to: row.to_on, share: TERMS[place]!.share }))
  await insertMany(db, 'minimums', terms.flatMap(term => (Object.keys(OFFERED) as DemoClass[]).map(code => ({
    term_id: term.id, class_id: category.get(code)!.id, min16: minimum16(code, term.share, category.get(code)!.step),
  }))))

  const madeAt = sqlTime(new Date(`${FIRST_DAY}T16:00:00Z`))
  await insertMany(db, 'fee_versions', FEES.map(({ version, from_on }) => ({ version, from_on, currency: SOCIETY_SETTINGS.currency, created_at: madeAt })))
  await insertMany(db, 'fees', FEES.flatMap(({ version, amount_minor, skulls_minor }) => [
    { version, class_id: null, amount_minor, currency: SOCIETY_SETTINGS.currency },
    ...['black-bear', 'grizzly-bear', 'cougar'].map(code => ({
      version, class_id: category.get(code)!.id, amount_minor: skulls_minor, currency: SOCIETY_SETTINGS.currency,
    })),
  ]))
  return { district, species, category, terms }
}

function classLines(district: SocietyIds['district'], category: SocietyIds['category']) {
  const offered = new Set<string>(Object.keys(OFFERED))
  const lines: { district_id: number, species_id: number, class_id: number, on_line: 0 | 1, side: string }[] = []
  for (const [code, { id, speciesId, species }] of category) {
    const range: Partial<Record<DistrictCode, number>> | undefined = RANGES[species as keyof typeof RANGES]
    if (!range || !offered.has(code)) continue
    for (const where of Object.keys(range) as DistrictCode[]) {
      const cut = species === ON_THE_LINE.species && ON_THE_LINE.districts.includes(where)
      lines.push({ district_id: district[where], species_id: speciesId, class_id: id, on_line: cut ? 1 : 0, side: cut ? ON_THE_LINE.side : '' })
    }
  }
  for (const [code, { id, speciesId, species }] of category) {
    if (species !== ON_THE_LINE.beyond || !code) continue
    for (const where of ON_THE_LINE.districts) {
      lines.push({ district_id: district[where], species_id: speciesId, class_id: id, on_line: 1, side: ON_THE_LINE.sideBeyond })
    }
  }
  return lines
}

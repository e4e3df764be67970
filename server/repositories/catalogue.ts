import type { Knex } from 'knex'

export interface ClassRecord {
  readonly id: number
  readonly code: string
  readonly species_id: number
  readonly species: string
  readonly definition: string
  readonly step: '1/8' | '1/16'
  readonly offered: 0 | 1
}

const classes = (db: Knex) => db('classes as c').join('species as s', 's.id', 'c.species_id')
  .select('c.id', 'c.code', 'c.species_id', 's.code as species', 'c.definition', 'c.step', 'c.offered')

export async function findClass(db: Knex, code: string): Promise<ClassRecord | undefined> {
  return classes(db).where('c.code', code).first()
}

export async function findClassById(db: Knex, id: number): Promise<ClassRecord | undefined> {
  return classes(db).where('c.id', id).first()
}

export interface DistrictRecord { readonly id: number, readonly code: string, readonly name: string }

export async function findDistrict(db: Knex, code: string): Promise<DistrictRecord | undefined> {
  return db('districts').where({ code }).first('id', 'code', 'name')
}

export async function findDistrictById(db: Knex, id: number): Promise<DistrictRecord | undefined> {
  return db('districts').where({ id }).first('id', 'code', 'name')
}

export async function listClassLines(db: Knex, districtId: number, speciesId: number): Promise<{ category: string, side: string }[]> {
  return db('class_lines as l').join('classes as c', 'c.id', 'l.class_id').where({ 'l.district_id': districtId, 'l.species_id': speciesId })
    .select('c.code as category', 'l.side')
}

/** The minimums term in force on a day. */
export async function findTerm(db: Knex, day: string): Promise<{ id: number, label: string } | undefined> {
  return db('minimums_terms').where('from_on', '<=', day).where(open => open.whereNull('to_on').orWhere('to_on', '>=', day))
    .orderBy('from_on', 'desc').first('id', 'label')
}

/** Least net of a class in a term, in sixteenths of an inch; undefined where the class has none. */
export async function findMinimum(db: Knex, termId: number, classId: number): Promise<number | undefined> {
  return (await db('minimums').where({ term_id: termId, class_id: classId }).first('min16'))?.min16
}

export interface FeeRecord { readonly version: number, readonly amount_minor: number, readonly currency: string }

/** The fee of a class in a version, or in the version in force on a day. A fee of the class itself goes before the general one. */
export async function findFee(db: Knex, classId: number, of: { version: number } | { day: string }): Promise<FeeRecord | undefined> {
  const version = 'version' in of
    ? of.version
    : (await db('fee_versions').where('from_on', '<=', of.day).orderBy('from_on', 'desc').orderBy('version', 'desc').first('version'))?.version
  if (version === undefined) return undefined
  return db('fees').where({ version }).where(own => own.where({ class_id: classId }).orWhereNull('class_id'))
    .orderByRaw('class_id IS NULL').first('version', 'amount_minor', 'currency')
}

export interface LedgerSums { readonly settled: number, readonly waived: boolean }

/**
 * What was paid for an entry less what went back, in minor units, and whether the fee was waived.
 *
 * @param currency ISO 4217 of the fee; money in another is in the ledger and pays nothing
 */
export async function sumLedger(db: Knex, entryId: number, currency: string | null): Promise<LedgerSums> {
  const rows = await db('ledger').where({ entry_id: entryId, ...currency === null ? {} : { currency } }).groupBy('kind').select('kind').sum({ amount: 'amount_minor' }) as { kind: string, amount: number | string }[]
  const of = (...kinds: string[]) => rows.filter(row => kinds.includes(row.kind)).reduce((sum, row) => sum + Number(row.amount), 0)
  return { settled: of('charge', 'office_payment') - of('refund', 'dispute'), waived: rows.some(row => row.kind === 'waiver') }
}

export async function listDistricts(db: Knex): Promise<DistrictRecord[]> {
  return db('districts').orderBy('sort').select('id', 'code', 'name')
}

export async function listSpeciesCodes(db: Knex): Promise<string[]> {
  return (await db('species').orderBy('sort').select('code')).map(one => one.code)
}

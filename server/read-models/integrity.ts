import type { Knex } from 'knex'
import type { EntryEventsRow, EventTextsRow, FilesRow, RecordsRow, SheetsRow } from '../../db/tables'

/** Reads whole tables for the integrity check, a page at a time, in the order of their ids. */
async function* pages<Row extends { id: number }>(page: (after: number) => Promise<Row[]>): AsyncGenerator<Row[]> {
  for (let after = 0; ;) {
    const rows = await page(after)
    if (rows.length === 0) return
    yield rows
    after = rows.at(-1)!.id
  }
}

const PAGE = 1_000

export type CheckedSheet = Pick<SheetsRow,
  'id' | 'uid' | 'kind' | 'number' | 'state' | 'definition' | 'measurements' | 'gross' | 'gross_all' | 'net' | 'net16' | 'gross16' | 'measured_on'
  | 'measurer_name' | 'dried_since' | 'signed_at' | 'hash' | 'slip_answers'> & { entry_uid: string | null, measurer_uid: string | null }

/** Sheets that have figures, with what their signature stands for. */
export const scoredSheets = (db: Knex) => pages<CheckedSheet>(after => db('sheets as s').leftJoin('entries as e', 'e.id', 's.entry_id')
  .leftJoin('users as u', 'u.id', 's.measurer_user_id').whereNotNull('s.net').where('s.id', '>', after).orderBy('s.id').limit(PAGE)
  .select('s.id', 's.uid', 's.kind', 's.number', 's.state', 's.definition', 's.measurements', 's.gross', 's.gross_all', 's.net', 's.net16', 's.gross16',
    's.measured_on', 's.measurer_name', 's.dried_since', 's.signed_at', 's.hash', 's.slip_answers', 'e.uid as entry_uid', 'u.uid as measurer_uid'))

export type CheckedRecord = Pick<RecordsRow, 'id' | 'record_no' | 'former_no' | 'class_id' | 'net16' | 'hunter_shown' | 'status'>

export const allRecords = (db: Knex) => pages<CheckedRecord>(after => db('records').where('id', '>', after)
  .orderBy('id').limit(PAGE).select('id', 'record_no', 'former_no', 'class_id', 'net16', 'hunter_shown', 'status'))

export interface CheckedToken { record_id: number, token: string, class_id: number, net16: number }

export const tokensBetween = (db: Knex, first: number, last: number): Promise<CheckedToken[]> =>
  db('record_tokens').whereBetween('record_id', [first, last]).select('record_id', 'token', 'class_id', 'net16')

export interface CheckedEntry { id: number, uid: string, state: string }

export const allEntries = (db: Knex) => pages<CheckedEntry>(after => db('entries').where('id', '>', after)
  .orderBy('id').limit(500).select('id', 'uid', 'state'))

export type CheckedEvent = EntryEventsRow & { actor_uid: string | null }

export const eventsBetween = (db: Knex, first: number, last: number): Promise<CheckedEvent[]> =>
  db('entry_events as e').leftJoin('users as u', 'u.id', 'e.actor_user_id').whereBetween('e.entry_id', [first, last])
    .orderBy(['e.entry_id', 'e.seq']).select('e.*', 'u.uid as actor_uid')

export const eventTextsBetween = (db: Knex, first: number, last: number): Promise<EventTextsRow[]> =>
  db('event_texts as t').join('entry_events as e', 'e.id', 't.event_id').whereBetween('e.entry_id', [first, last]).select('t.*')

export const allFiles = (db: Knex) => pages<Pick<FilesRow, 'id' | 'sha256' | 'size' | 'storage_key'>>(after => db('files').where('id', '>', after)
  .orderBy('id').limit(PAGE).select('id', 'sha256', 'size', 'storage_key'))

/** Most findings of one kind; a registry that is wrong throughout needs no longer list. */
const MOST = 500

async function found<Row>(db: Knex, sql: string): Promise<Row[]> {
  const [rows] = await db.raw(`${sql} LIMIT ${MOST}`) as [Row[]]
  return rows
}

const LISTED = 'status IN (\'accepted\', \'challenged\')'

/** What list_counts has to hold, counted from the records. */
const LISTS = [['0', '\'\'', ''], ['district_id', '\'\'', ''], ['0', 'method', 'AND method IS NOT NULL'], ['district_id', 'method', 'AND method IS NOT NULL']]
  .map(([district, method, and]) => `SELECT class_id, ${district!} AS district_id, ${method!} AS method, net16, COUNT(*) AS n FROM records WHERE ${LISTED} ${and!} GROUP BY 1, 2, 3, 4`)
  .join(' UNION ALL ')

const FACETS = `SELECT class_id, district_id, IFNULL(method, '') AS method, IF(taken_precision = 'unknown', 0, YEAR(taken_first_on)) AS year, COUNT(*) AS n
  FROM records WHERE ${LISTED} GROUP BY 1, 2, 3, 4`

export interface WrongCount { place: string, kept: number, counted: number }

function wrongCounts(db: Knex, kept: string, counted: string, columns: readonly string[]): Promise<WrongCount[]> {
  const same = columns.map(column => `k.${column} = c.${column}`).join(' AND ')
  const place = (side: string) => `CONCAT_WS('/', ${columns.map(column => `${side}.${column}`).join(', ')})`
  return found<WrongCount>(db, `
    SELECT ${place('c')} AS place, IFNULL(k.n, 0) AS kept, c.n AS counted FROM (${counted}) c LEFT JOIN ${kept} k ON ${same} WHERE IFNULL(k.n, 0) <> c.n
    UNION ALL
    SELECT ${place('k')} AS place, k.n AS kept, 0 AS counted FROM ${kept} k LEFT JOIN (${counted}) c ON ${same} WHERE c.n IS NULL AND k.n <> 0`)
}

/** Cells of the kept counts that differ from the records; `place` is class/district/method/net. */
export const wrongListCounts = (db: Knex) => wrongCounts(db, 'list_counts', LISTS, ['class_id', 'district_id', 'method', 'net16'])
/** The same for the facets; `place` is class/district/method/year. */
export const wrongFacetCounts = (db: Knex) => wrongCounts(db, 'facet_counts', FACETS, ['class_id', 'district_id', 'method', 'year'])

/** Records whose figures, class or standing are not those of their entry and their sheet. */
export const wrongRecords = (db: Knex) => found<{ record_no: number, what: string }>(db, `
  SELECT r.record_no, CASE
      WHEN r.net16 <> e.net16 OR r.gross16 <> e.gross16 THEN 'entry'
      WHEN s.id IS NOT NULL AND (r.net16 <> s.net16 OR r.gross16 <> s.gross16) THEN 'sheet'
      WHEN r.class_id <> e.class_id THEN 'class'
      WHEN r.status <> e.state THEN 'state' END AS what
  FROM records r JOIN entries e ON e.id = r.entry_id LEFT JOIN sheets s ON s.id = r.sheet_id
  HAVING what IS NOT NULL`)

/** Entries that stand in the lists without a record, and the other way round. */
export const listedWithoutRecord = (db: Knex) => found<{ uid: string, state: string }>(db, `
  SELECT e.uid, e.state FROM entries e LEFT JOIN records r ON r.entry_id = e.id
  WHERE e.state IN ('accepted', 'challenged') AND r.id IS NULL`)

/** Whether a number could be given out twice: the counter lies under the highest number given. */
export async function recordNumbers(db: Knex): Promise<{ counter: number, highest: number }> {
  const counter = await db('counters').where({ name: 'record_no' }).first('value')
  const highest = await db('records').max({ value: 'record_no' }).first() as { value: number | null } | undefined
  return { counter: counter?.value ?? 0, highest: highest?.value ?? 0 }
}

/** Charges, refunds and checkouts that do not go together. */
export const paidWithoutCharge = (db: Knex) => found<{ uid: string }>(db, `
  SELECT c.uid FROM checkouts c LEFT JOIN ledger l ON l.checkout_id = c.id AND l.kind = 'charge' WHERE c.state = 'paid' AND l.id IS NULL`)

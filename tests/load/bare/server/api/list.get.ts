import { createPool, type Pool } from 'mysql2/promise'

let pool: Pool | undefined

/** The first fifty of a class by net: one statement and its rows as they are. */
export default defineEventHandler(async (event) => {
  pool ??= createPool({ uri: process.env.DATABASE_URL, dateStrings: true, timezone: 'Z', connectionLimit: 10 })
  const [rows] = await pool.query(
    `SELECT r.id, r.record_no, r.former_no, r.class_id, r.district_id, r.method, r.origin, r.sex, r.net16, r.gross16, r.taken_year, r.hunter_shown,
            r.accepted_on, r.status, r.source, r.key_figures
       FROM records AS r FORCE INDEX (ix_records_class_net)
      WHERE r.status IN ('accepted', 'challenged') AND r.class_id = ?
      ORDER BY r.net16 DESC, r.taken_first_on, r.id LIMIT 50`,
    [Number(getQuery(event).class)],
  )
  return rows
})

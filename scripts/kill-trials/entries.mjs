import { randomUUID } from 'node:crypto'
import { Client, is2xx } from './client.mjs'
import { sleep } from '../lib/processes.mjs'

/** @typedef {{ version: number, names: Set<string> }} Expected the newest version answered, and the names it may bear */

/**
 * Begins entries and changes them. What was answered must be there in that version or a newer one, and may bear the
 * name that was answered last or one that was sent after it and never answered.
 *
 * @param {string} url
 * @returns {Promise<import('./client.mjs').Load>}
 */
export async function entries(url) {
  const clients = []
  for (const account of ['entrant', 'shop']) clients.push(await new Client(url).signIn(account))
  /** @type {Map<string, Expected>} */
  const expected = new Map()
  let answered = 0

  /** @param {Client} client @param {number} number @param {AbortSignal} stop */
  async function one(client, number, stop) {
    for (let round = 0; !stop.aborted; round++) {
      const name = `Hunter ${number} ${round}`
      // An id of one's own makes a repetition harmless, also one whose first try was killed half-way.
      const own = randomUUID()
      const created = await persist(stop, () => client.send('POST', '/api/entries', {
        json: { id: own, category: 'mule-deer-typical', origin: 'hunted', hunterName: name },
      }))
      if (!created || !is2xx(created)) {
        await sleep(100)
        continue
      }
      answered++
      const { id } = created.body
      const entry = { version: created.body.version, names: new Set([name]) }
      expected.set(id, entry)
      for (let change = 0; change < 3 && !stop.aborted; change++) {
        const next = `${name} ${change}`
        entry.names.add(next)
        const changed = await client.send('PATCH', `/api/entries/${id}`, { json: { hunterName: next }, headers: { 'if-match': `"${entry.version}"` } }).catch(() => null)
        if (changed && is2xx(changed)) {
          answered++
          entry.version = changed.body.version
          entry.names = new Set([next])
        }
        else if (changed?.status === 412) {
          // The change whose answer was cut off had been made.
          entry.version = changed.body.current?.version ?? entry.version
        }
        else {
          await sleep(50)
        }
      }
    }
  }

  return {
    name: 'entries',
    work: async (stop) => {
      await Promise.all(clients.flatMap((client, place) => [one(client, place * 2, stop), one(client, place * 2 + 1, stop)]))
    },
    verify: async (databaseUrl) => {
      const { createConnection } = await import('mysql2/promise')
      const database = await createConnection(databaseUrl)
      const problems = []
      const [keys] = await database.query('SELECT COUNT(*) AS n, COUNT(DISTINCT hunter.name) AS names FROM entries e JOIN entry_people hunter ON hunter.entry_id = e.id AND hunter.part = \'hunter\' WHERE hunter.name LIKE \'Hunter %\'')
      const { n, names } = /** @type {{ n: number, names: number }[]} */ (keys)[0] ?? { n: 0, names: 0 }
      if (n !== names) problems.push(`${n} entries with ${names} names: a repeated POST made a second entry`)
      for (const [id, { version, names: possible }] of expected) {
        const [rows] = await database.query('SELECT e.version, hunter.name FROM entries e LEFT JOIN entry_people hunter ON hunter.entry_id = e.id AND hunter.part = \'hunter\' WHERE e.uid = ?', [id])
        const row = /** @type {{ version: number, name: string }[]} */ (rows)[0]
        if (!row) problems.push(`entry ${id} is not there`)
        else if (row.version < version) problems.push(`entry ${id} has version ${row.version}, answered was ${version}`)
        else if (!possible.has(row.name)) problems.push(`entry ${id} bears "${row.name}", expected one of ${[...possible].join(', ')}`)
      }
      await database.end()
      return { answered, problems }
    },
  }
}

/**
 * Repeats a request until an answer comes that is final, as a careful program would.
 *
 * @param {AbortSignal} stop
 * @param {() => Promise<import('./client.mjs').Answer>} send
 */
async function persist(stop, send) {
  for (;;) {
    const answer = await send().catch(() => null)
    if (answer && answer.status < 500) return answer
    if (stop.aborted) return null
    await sleep(60)
  }
}

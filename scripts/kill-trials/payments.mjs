import { Client, is2xx } from './client.mjs'
import { sleep } from '../lib/processes.mjs'

/** Messages of the payments service may come late: it repeats them until they are taken. */
const ARRIVES_MS = 60_000

/**
 * Begins entries and pays their fees at the stand-in. Every payment that the stand-in confirmed must be in the ledger,
 * once.
 *
 * @param {string} url
 * @returns {Promise<import('./client.mjs').Load>}
 */
export async function payments(url) {
  const client = await new Client(url).signIn('entrant')
  /** @type {Set<string>} entries that are paid for */
  const paid = new Set()

  return {
    name: 'payments',
    work: async (stop) => {
      while (!stop.aborted) {
        const created = await client.send('POST', '/api/entries', { json: { category: 'elk-typical', origin: 'hunted', hunterName: 'Who pays' } }).catch(() => null)
        const page = is2xx(created) ? await untilAnswered(stop, () => client.send('POST', `/api/entries/${created?.body.id}/checkout`)) : null
        if (is2xx(page)) {
          const chosen = await client.send('POST', page?.body.url, { form: { card: 'taken' } }).catch(() => null)
          if (chosen?.status === 303) paid.add(created?.body.id)
        }
        await sleep(30)
      }
    },
    verify: async (databaseUrl) => {
      const { createConnection } = await import('mysql2/promise')
      const database = await createConnection(databaseUrl)
      const until = Date.now() + ARRIVES_MS
      /** @type {string[]} */
      let problems = []
      do {
        problems = []
        for (const id of paid) {
          const [rows] = await database.query('SELECT COUNT(*) AS n FROM ledger l JOIN entries e ON e.id = l.entry_id WHERE e.uid = ? AND l.kind = \'charge\'', [id])
          const n = /** @type {{ n: number }[]} */ (rows)[0]?.n
          if (n !== 1) problems.push(`entry ${id} was paid and has ${n} charges in the ledger`)
        }
        if (problems.length > 0) await sleep(500)
      } while (problems.length > 0 && Date.now() < until)
      await database.end()
      return { answered: paid.size, problems }
    },
  }
}

/** @param {AbortSignal} stop @param {() => Promise<import('./client.mjs').Answer>} send */
async function untilAnswered(stop, send) {
  for (let attempt = 0; attempt < 100 && !stop.aborted; attempt++) {
    const answer = await send().catch(() => null)
    if (answer && answer.status < 500) return answer
    await sleep(60)
  }
  return null
}

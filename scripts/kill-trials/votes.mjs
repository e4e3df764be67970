import { Client, is2xx } from './client.mjs'
import { sleep } from '../lib/processes.mjs'

const JUDGES = ['judge1', 'judge2', 'judge3', 'judge4', 'judge5', 'judge6', 'judge7', 'judge8']

/**
 * Judges of the open sitting vote, and vote anew. A ballot that was answered must be there, with that vote or one that
 * was sent after it and never answered.
 *
 * @param {string} url
 * @param {string} databaseUrl
 * @returns {Promise<import('./client.mjs').Load>}
 */
export async function votes(url, databaseUrl) {
  const { createConnection } = await import('mysql2/promise')
  const database = await createConnection(databaseUrl)
  const [rows] = await database.query('SELECT s.uid AS sitting, d.uid AS item FROM docket_items d JOIN sittings s ON s.id = d.sitting_id WHERE s.state = \'open\' AND d.state = \'open\' AND d.kind = \'entry\' ORDER BY d.id')
  await database.end()
  const items = /** @type {{ sitting: string, item: string }[]} */ (rows)
  const clients = []
  for (const judge of JUDGES) clients.push({ judge, client: await new Client(url).signIn(judge) })
  /** @type {Map<string, Set<string>>} judge and item to the votes it may be */
  const expected = new Map()
  let answered = 0

  return {
    name: 'votes',
    work: async (stop) => {
      await Promise.all(clients.map(async ({ judge, client }) => {
        for (let round = 0; !stop.aborted; round++) {
          const target = items[round % items.length]
          if (!target) return
          const vote = round % 2 === 0 ? 'accept' : 'return'
          const key = `${judge} ${target.item}`
          const possible = expected.get(key)
          possible?.add(vote)
          const answer = await client.send('PUT', `/api/sittings/${target.sitting}/items/${target.item}/ballot`, {
            json: vote === 'accept' ? { vote } : { vote, reason: `round ${round}`, requests: ['a sharper photograph'] },
          }).catch(() => null)
          if (is2xx(answer)) {
            answered++
            expected.set(key, new Set([vote]))
          }
          await sleep(answer ? 20 : 80)
        }
      }))
    },
    verify: async (address) => {
      const connection = await createConnection(address)
      const [found] = await connection.query('SELECT u.email, d.uid AS item, b.vote, COUNT(*) OVER (PARTITION BY b.docket_item_id, b.judge_user_id) AS n FROM ballots b JOIN docket_items d ON d.id = b.docket_item_id JOIN users u ON u.id = b.judge_user_id')
      await connection.end()
      const cast = new Map(/** @type {{ email: string, item: string, vote: string, n: number }[]} */ (found).map(row => [`${row.email.split('@')[0]} ${row.item}`, row]))
      const problems = []
      for (const [key, possible] of expected) {
        const ballot = cast.get(key)
        if (!ballot) problems.push(`the ballot of ${key} is not there`)
        else if (ballot.n > 1) problems.push(`${key} has ${ballot.n} ballots`)
        else if (!possible.has(ballot.vote)) problems.push(`the ballot of ${key} is ${ballot.vote}, expected ${[...possible].join(' or ')}`)
      }
      return { answered, problems }
    },
  }
}

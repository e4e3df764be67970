import pino from 'pino'
import { beforeEach, describe, expect, test } from 'vitest'
import { fixedClock } from '../../server/clock'
import type { Registry } from '../../server/composition'
import { MailFailure, type MailTransport, type Message } from '../../server/mail/transport'
import { claimDue, settle } from '../../server/repositories/leases'
import { deliverNotices } from '../../server/services/notices/deliver'
import { tokenHash } from '../../server/services/notices/mint'
import { queueNotice, type Notice } from '../../server/services/notices/queue'
import { useDatabase } from '../support/database'

const base = useDatabase()
const clock = fixedClock('2026-03-02T15:00:00Z')
const never = new AbortController().signal

function registry(): Registry {
  return {
    config: { publicUrl: 'https://lists.ochrebasin.example', mode: 'demo' },
    db: base.db,
    clock,
    log: pino({ level: 'silent' }),
    settings: async () => ({ societyName: 'A Society', regionName: '', timeZone: 'UTC', currency: 'USD', officeEmail: 'office@ochrebasin.example' }),
    close: async () => {},
  } as unknown as Registry
}

function mailServer(behave: (message: Message) => void = () => {}): MailTransport & { taken: Message[] } {
  const taken: Message[] = []
  return {
    taken,
    async send(message) {
      behave(message)
      taken.push(message)
    },
    async close() {},
  }
}

const queue = (more: Partial<Notice> = {}) => queueNotice(base.db, clock.now(), {
  template: 'role_given', toEmail: 'a@ochrebasin.example', userId: null, args: { name: 'A', role: 'judge' }, ...more,
})
const later = (seconds: number) => clock.set(new Date(clock.now().getTime() + seconds * 1000))

beforeEach(async () => {
  await base.db('notices').delete()
  await base.db('user_tokens').delete()
  clock.set('2026-03-02T15:00:00Z')
})

describe('the outbox', () => {
  test('sends each notice once and remembers under which Message-ID', async () => {
    await queue()
    await queue({ toEmail: 'b@ochrebasin.example' })
    const server = mailServer()
    expect(await deliverNotices(registry(), server, never)).toEqual({ sent: 2, failed: 0, serverAway: false })
    expect(await deliverNotices(registry(), server, never)).toEqual({ sent: 0, failed: 0, serverAway: false })
    expect(server.taken.map(message => message.to).sort()).toEqual(['a@ochrebasin.example', 'b@ochrebasin.example'])
    const rows = await base.db('notices').select('state', 'message_id')
    expect(rows.map(row => row.state)).toEqual(['sent', 'sent'])
    expect(rows.map(row => row.message_id).sort()).toEqual(server.taken.map(message => message.messageId).sort())
  })

  test('an undone transaction tells nobody', async () => {
    await base.db.transaction(async (trx) => {
      await queueNotice(trx, clock.now(), { template: 'role_given', toEmail: 'a@ochrebasin.example', userId: null, args: {} })
      throw new Error('undone')
    }).catch(() => {})
    expect(await base.db('notices').count({ n: '*' })).toEqual([{ n: 0 }])
  })

  test('a mail server that is away loses nothing, however long', async () => {
    for (let i = 0; i < 15; i++) await queue({ toEmail: `p${i}@ochrebasin.example` })
    const away = mailServer(() => {
      throw new MailFailure('server', 'connect ECONNREFUSED')
    })
    for (let round = 0; round < 40; round++) {
      await deliverNotices(registry(), away, never)
      later(60)
    }
    expect(await base.db('notices').where({ state: 'waiting' }).count({ n: '*' })).toEqual([{ n: 15 }])
    const back = mailServer()
    while ((await deliverNotices(registry(), back, never)).sent > 0);
    expect(new Set(back.taken.map(message => message.to)).size).toBe(15)
    expect(back.taken).toHaveLength(15)
  })

  test('a message that is refused does not hold up the others, and is shown as failed in the end', async () => {
    await queue({ toEmail: 'refused@ochrebasin.example' })
    await queue({ toEmail: 'taken@ochrebasin.example' })
    const server = mailServer(({ to }) => {
      if (to.startsWith('refused')) throw new MailFailure('message', '550 no such mailbox')
    })
    for (let round = 0; round < 8; round++) {
      await deliverNotices(registry(), server, never)
      later(7 * 3600)
    }
    expect(server.taken.map(message => message.to)).toEqual(['taken@ochrebasin.example'])
    expect(await base.db('notices').where({ to_email: 'refused@ochrebasin.example' }).first('state', 'last_error', 'attempts'))
      .toEqual({ state: 'failed', last_error: '550 no such mailbox', attempts: 6 })
  })

  test('a worker that dies between sending and saying so sends again under the same Message-ID', async () => {
    await queue()
    const server = mailServer()
    const [lease] = await claimDue(base.db, 'notices', clock.now(), 120_000, 10)
    expect(lease).toBeDefined()
    expect((await deliverNotices(registry(), server, never)).sent).toBe(0)
    later(121)
    expect((await deliverNotices(registry(), server, never)).sent).toBe(1)
    const row = await base.db('notices').first('uid')
    expect(server.taken[0]!.messageId).toBe(`<${row!.uid}@lists.ochrebasin.example>`)
    // The dead worker comes to its senses: its word no longer counts.
    expect(await settle(base.db, lease!, { state: 'failed' })).toBe(false)
  })

  test('two workers never take the same notice', async () => {
    for (let i = 0; i < 30; i++) await queue({ toEmail: `p${i}@ochrebasin.example` })
    const taken = await Promise.all([1, 2, 3, 4].map(() => claimDue(base.db, 'notices', clock.now(), 60_000, 10)))
    const ids = taken.flat().map(lease => lease.id)
    expect(new Set(ids).size).toBe(ids.length)
    expect(ids.length).toBe(30)
  })

  test('a secret link is made when the notice is sent, and only its hash is kept', async () => {
    const userId = Number((await base.db('users').insert({ uid: '01900000-0000-7000-8000-000000000001', email: 'a@ochrebasin.example', name: 'A', created_at: '2026-01-01 00:00:00' }))[0])
    await queue({ template: 'reset_password', userId, args: { name: 'A' }, tokenPayload: { asked: 'by a form' } })
    expect(await base.db('user_tokens').count({ n: '*' })).toEqual([{ n: 0 }])
    const server = mailServer()
    await deliverNotices(registry(), server, never)
    const link = /https:\/\/lists\.ochrebasin\.example(\/\S+)/.exec(server.taken[0]!.text)![1]!
    const token = new URL(link, 'https://x.example').searchParams.get('token')!
    expect(await base.db('user_tokens').first('kind', 'user_id', 'token_hash', 'expires_at', 'payload')).toEqual({
      kind: 'reset_password', user_id: userId, token_hash: tokenHash(token), expires_at: '2026-03-02 16:00:00.000', payload: '{"asked":"by a form"}',
    })
    const row = await base.db('notices').first('args')
    expect(row!.args).not.toContain('asked')
    expect(row!.args).not.toContain(token)
  })

  test('a worker that is told to stop gives back what it has not begun', async () => {
    await queue()
    const stopping = new AbortController()
    stopping.abort()
    await deliverNotices(registry(), mailServer(), stopping.signal)
    expect(await base.db('notices').first('state', 'attempts', 'claimed_until')).toEqual({ state: 'waiting', attempts: 0, claimed_until: null })
    expect((await deliverNotices(registry(), mailServer(), never)).sent).toBe(1)
  })
})

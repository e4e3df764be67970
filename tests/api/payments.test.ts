import Stripe from 'stripe'
import { beforeAll, beforeEach, describe, expect, test } from 'vitest'
import { runPaymentCommands } from '../../server/services/payments/commands'
import { useApp, type Client } from '../support/app'
import { makeScene, type Scene } from '../support/scene'

const app = useApp()
let scene: Scene
let entrant: Client
let office: Client
let uid: string

beforeAll(async () => {
  scene = await makeScene(Object.assign(app.registry, { at: app.clock.set, pass: app.clock.pass }))
  entrant = await app.signIn({ ...scene.cast.entrant })
  office = await app.signIn({ ...scene.cast.reviewer })
})
beforeEach(async () => {
  uid = await scene.entry('draft')
})

const faults = (wished: Record<string, boolean>) => app.visitor.post('/pay').type('form').send(Object.fromEntries(Object.entries(wished).map(([name, value]) => [name, String(value)])))
const pageOf = async (id = uid) => new URL((await entrant.post(`/api/entries/${id}/checkout`).send({})).body.url).pathname
const choose = (page: string, card: string) => app.visitor.post(page).type('form').send({ card })
const money = async (id = uid) => (await entrant.get(`/api/entries/${id}/money`)).body
const ledger = async (id = uid) => app.db('ledger as l').join('entries as e', 'e.id', 'l.entry_id').where('e.uid', id).orderBy('l.id').select('l.kind', 'l.amount_minor as amount', 'l.provider_id', 'l.reason')
const kinds = async (id = uid) => (await ledger(id)).map(row => row.kind)
/** The provider's commands, as the worker does them. */
const work = async () => { while (await runPaymentCommands(app.registry)); }

/** A message as the payments service sends it, signed by the published scheme of its SDK (`t=…,v1=HMAC-SHA256`). */
function message(type: string, object: object, { id = `evt_${Math.random().toString(36).slice(2)}`, secret = app.registry.config.stripe!.webhookSecret } = {}) {
  const payload = JSON.stringify({ id, object: 'event', type, api_version: null, created: 1, livemode: false, data: { object } })
  return app.visitor.post('/api/payments/webhook').set('content-type', 'application/json').set('stripe-signature', Stripe.webhooks.generateTestHeaderString({ payload, secret })).send(payload)
}
async function sessionOf(id = uid) {
  await pageOf(id)
  const checkout = (await app.db('checkouts as c').join('entries as e', 'e.id', 'c.entry_id').where('e.uid', id).orderBy('c.id', 'desc').first('c.uid', 'c.provider_id'))!
  return { id: checkout.provider_id, object: 'checkout.session', client_reference_id: checkout.uid, payment_status: 'paid', payment_intent: `pi_${checkout.uid}`, amount_total: 4000, currency: 'usd', metadata: {} }
}

describe('paying', () => {
  test('a card that is refused books nothing and leaves the page open; one that is taken books once', async () => {
    const page = await pageOf()
    expect((await choose(page, 'declined')).headers.location).toBe(`${page}?declined`)
    await expect.poll(async () => (await entrant.get(`/api/entries/${uid}/events`)).body.items.map((event: { kind: string }) => event.kind)).toContain('payment_failed')
    expect(await kinds()).toEqual([])
    expect(await pageOf()).toBe(page)
    await choose(page, 'taken')
    await choose(page, 'taken')
    await expect.poll(() => kinds()).toEqual(['charge'])
    expect(await money()).toMatchObject({ dueMinor: 4000, settledMinor: 4000, openMinor: 0 })
    expect((await entrant.post(`/api/entries/${uid}/checkout`).send({})).body).toMatchObject({ status: 409, code: 'nothing_due' })
  })

  test('left without paying, the same page opens again; run out, a new one', async () => {
    const page = await pageOf()
    expect((await choose(page, 'left')).headers.location).toMatch(/payment=left$/)
    expect(await pageOf()).toBe(page)
    await choose(page, 'expired')
    await expect.poll(async () => (await app.db('checkouts as c').join('entries as e', 'e.id', 'c.entry_id').where('e.uid', uid).first('c.state'))!.state).toBe('expired')
    expect(await pageOf()).not.toBe(page)
    expect(await kinds()).toEqual([])
  })

  test('with the service out of order: 503 in words, nothing booked, and the same wish goes through later', async () => {
    await faults({ outage: true })
    try {
      const answer = await entrant.post(`/api/entries/${uid}/checkout`).send({})
      expect(answer.body).toMatchObject({ status: 503, code: 'payments_away' })
      expect(answer.body.detail).toMatch(/payment/i)
    }
    finally {
      await faults({ outage: false })
    }
    app.clock.pass(1 / 24)
    expect(await pageOf()).toMatch(/^\/pay\//)
    expect((await app.db('checkouts as c').join('entries as e', 'e.id', 'c.entry_id').where('e.uid', uid).select('c.id'))).toHaveLength(1)
  })

  test('somebody else opens no page, and reads no money', async () => {
    const other = await app.signIn({ ...scene.cast.other })
    expect((await other.post(`/api/entries/${uid}/checkout`).send({})).status).toBe(404)
    expect((await other.get(`/api/entries/${uid}/money`)).status).toBe(404)
  })
})

describe('messages of the payments service', () => {
  test('with a wrong signature, an old one or none: 400, and nothing happens', async () => {
    const session = await sessionOf()
    expect((await message('checkout.session.completed', session, { secret: 'whsec_of_somebody_else' })).status).toBe(400)
    expect((await app.visitor.post('/api/payments/webhook').send({ type: 'checkout.session.completed' })).status).toBe(400)
    const payload = JSON.stringify({ id: 'evt_old', object: 'event', type: 'checkout.session.completed', data: { object: session } })
    const old = Stripe.webhooks.generateTestHeaderString({ payload, secret: app.registry.config.stripe!.webhookSecret, timestamp: Math.floor(Date.now() / 1000) - 3600 })
    expect((await app.visitor.post('/api/payments/webhook').set('content-type', 'application/json').set('stripe-signature', old).send(payload)).status).toBe(400)
    expect(await kinds()).toEqual([])
  })

  test('sent twice, at once and later, books once', async () => {
    const session = await sessionOf()
    const answers = await Promise.all([message('checkout.session.completed', session, { id: 'evt_twice' }), message('checkout.session.completed', session, { id: 'evt_twice' })])
    expect(answers.map(answer => answer.status)).toEqual([200, 200])
    expect((await message('checkout.session.completed', session, { id: 'evt_twice' })).status).toBe(200)
    expect((await message('checkout.session.completed', session, { id: 'evt_other' })).status).toBe(200)
    expect(await kinds()).toEqual(['charge'])
  })

  test('one that says "completed" before the money is there books nothing; the later one does', async () => {
    const session = await sessionOf()
    await message('checkout.session.completed', { ...session, payment_status: 'unpaid' })
    expect(await kinds()).toEqual([])
    await message('checkout.session.async_payment_succeeded', session)
    expect(await kinds()).toEqual(['charge'])
  })

  test('of less than the fee: booked as what it is, the rest stays open and the next page asks for the rest alone', async () => {
    const session = await sessionOf()
    await message('checkout.session.completed', { ...session, amount_total: 1500 })
    expect(await money()).toMatchObject({ dueMinor: 4000, settledMinor: 1500, openMinor: 2500 })
    await pageOf()
    const next = await app.db('checkouts as c').join('entries as e', 'e.id', 'c.entry_id').where({ 'e.uid': uid, 'c.state': 'open' }).first('c.amount_minor')
    expect(next).toEqual({ amount_minor: 2500 })
  })

  test('in a currency that is not the fee\'s: booked, asked back, and nothing is paid by it', async () => {
    await message('checkout.session.completed', { ...await sessionOf(), currency: 'jpy' })
    expect(await money()).toMatchObject({ settledMinor: 0, openMinor: 4000, lines: [{ kind: 'charge', currency: 'JPY', amountMinor: 4000 }] })
    const asked = await app.db('payment_commands as c').join('entries as e', 'e.id', 'c.entry_id').where({ 'e.uid': uid, 'c.kind': 'refund' }).first('c.payload')
    expect(JSON.parse(asked!.payload)).toMatchObject({ amount: 4000, currency: 'JPY', reason: 'other_currency' })
    expect(await pageOf()).toMatch(/^\/pay\//)
  })

  test('paid a second time on another page: booked, and the second given back', async () => {
    const session = await sessionOf()
    await message('checkout.session.completed', session)
    await message('checkout.session.completed', { ...session, payment_intent: `pi_again_${uid}` })
    expect(await kinds()).toEqual(['charge', 'charge'])
    const asked = await app.db('payment_commands as c').join('entries as e', 'e.id', 'c.entry_id').where({ 'e.uid': uid, 'c.kind': 'refund' }).select('c.payload')
    expect(asked.map(row => JSON.parse(row.payload))).toMatchObject([{ charge: `pi_again_${uid}`, reason: 'paid_twice' }])
  })

  test('after a withdrawal the money is booked and given back by itself', async () => {
    const session = await sessionOf()
    await scene.move(scene.cast.entrant, uid, { transition: 'withdraw', confirm: true })
    await message('checkout.session.completed', session)
    expect(await kinds()).toEqual(['charge'])
    expect((await app.db('payment_commands as c').join('entries as e', 'e.id', 'c.entry_id').where({ 'e.uid': uid, 'c.kind': 'refund' }).select('c.state'))).toEqual([{ state: 'waiting' }])
  })

  test('about nothing of ours, or of a kind nobody knows, is thanked for', async () => {
    expect((await message('checkout.session.completed', { id: 'cs_x', object: 'checkout.session', client_reference_id: 'x', payment_status: 'paid', payment_intent: 'pi_x', metadata: {} })).status).toBe(200)
    expect((await message('customer.created', { id: 'cus_x', object: 'customer' })).status).toBe(200)
  })
})

describe('money that goes back', () => {
  async function paid(): Promise<void> {
    await choose(await pageOf(), 'taken')
    await expect.poll(() => kinds()).toEqual(['charge'])
  }

  test('a paid entry that is withdrawn is refunded once, through an outage', async () => {
    await paid()
    await scene.move(scene.cast.entrant, uid, { transition: 'withdraw', confirm: true })
    await faults({ outage: true })
    await runPaymentCommands(app.registry)
    expect(await kinds()).toEqual(['charge'])
    await faults({ outage: false, duplicates: true })
    app.clock.pass(1)
    await work()
    await expect.poll(() => kinds()).toEqual(['charge', 'refund'])
    await work()
    await faults({ duplicates: false })
    expect(await kinds()).toEqual(['charge', 'refund'])
    expect(await money()).toMatchObject({ settledMinor: 0 })
  })

  test('a refund that fails at the bank, and a dispute that is won, bring the money back, once', async () => {
    await paid()
    const [{ provider_id: payment } = { provider_id: '' }] = await ledger()
    const refund = { id: `re_${uid}`, object: 'refund', payment_intent: payment, amount: 4000, currency: 'usd', status: 'pending' }
    await message('refund.created', refund)
    expect(await money()).toMatchObject({ settledMinor: 0 })
    await message('refund.failed', { ...refund, status: 'failed' })
    await message('refund.updated', { ...refund, status: 'failed' })
    expect(await money()).toMatchObject({ settledMinor: 4000 })
    const dispute = { id: `dp_${uid}`, object: 'dispute', payment_intent: payment, amount: 4000, currency: 'usd', status: 'needs_response' }
    await message('charge.dispute.created', dispute)
    expect(await money()).toMatchObject({ settledMinor: 0 })
    await message('charge.dispute.closed', { ...dispute, status: 'lost' })
    expect(await money()).toMatchObject({ settledMinor: 0 })
    await message('charge.dispute.closed', { ...dispute, status: 'won' })
    expect(await money()).toMatchObject({ settledMinor: 4000, openMinor: 0 })
    expect(await kinds()).toEqual(['charge', 'refund', 'charge', 'dispute', 'charge'])
  })
})

describe('the office', () => {
  test('waives a fee with a reason, and books one that was paid at its counter; nobody else does', async () => {
    uid = await scene.entry('certified')
    expect((await entrant.post(`/api/entries/${uid}/money`).send({ kind: 'waiver', reason: 'me' })).status).toBe(403)
    expect((await office.post(`/api/entries/${uid}/money`).send({ kind: 'waiver', reason: ' ' })).body.errors).toMatchObject([{ path: 'reason' }])
    const waived = await office.post(`/api/entries/${uid}/money`).send({ kind: 'waiver', reason: 'A minor\'s first head' })
    expect(waived.body).toMatchObject({ waived: true, openMinor: 0 })
    expect((await office.post(`/api/entries/${uid}/money`).send({ kind: 'office_payment', reason: 'cheque 7' })).body).toMatchObject({ status: 409, code: 'nothing_due' })
    const second = await scene.entry('certified')
    expect((await office.post(`/api/entries/${second}/money`).send({ kind: 'office_payment', reason: 'cheque 8' })).body).toMatchObject({ settledMinor: 4000, openMinor: 0 })
    expect(await kinds(second)).toEqual(['office_payment'])
  })
})

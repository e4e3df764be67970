import type { Page } from 'playwright-core'
import sharp from 'sharp'
import { beforeAll, describe, expect, test } from 'vitest'
import { seedDemo } from '../../seeds/demo'
import { MAIL_DOMAIN } from '../../seeds/demo/accounts'
import { useApp, type Client } from '../support/app'
import { fits, useBrowser, visit } from '../support/browser'

const app = useApp({ at: '2026-06-02T15:00:00.000Z' })
const browser = useBrowser(app)

beforeAll(async () => {
  await seedDemo(app.db, { now: app.clock.now(), scale: 0.05, files: app.registry.storage })
})

async function signedInAs(where: object): Promise<Client> {
  const user = (await app.db('users').where(where).first('id', 'uid', 'name', 'email'))!
  return app.signIn({ userId: user.id, uid: user.uid, name: user.name, email: user.email, roles: [] })
}
const signedIn = (mail: string) => signedInAs({ email: `${mail}@${MAIL_DOMAIN}` })

/** An entry of the demo that stands there, the one with the most papers. */
async function entryAt(state: string, where: object = {}): Promise<string> {
  const row = await app.db('entries as e').leftJoin('documents as d', 'd.entry_id', 'e.id').where({ 'e.state': state, ...where }).groupBy('e.id').orderByRaw('COUNT(d.id) DESC').first('e.uid')
  if (!row) throw new Error(`The demo has no entry in ${state}`)
  return row.uid
}
const idOf = async (mail: string) => (await app.db('users').where({ email: `${mail}@${MAIL_DOMAIN}` }).first('id'))!.id
const sittingAt = async (state: string) => (await app.db('sittings as s').join('docket_items as d', 'd.sitting_id', 's.id').join('entries as e', 'e.id', 'd.entry_id').where({ 's.state': state }).first('s.uid', 'e.uid as entry'))!

describe('the desk\'s pages fit every width in light and dark, and axe finds nothing', () => {
  test.each([
    ['home-entrant', 'entrant', async (): Promise<string> => '/desk'],
    ['home-measurer', 'measurer', async (): Promise<string> => '/desk'],
    ['home-reviewer', 'reviewer', async (): Promise<string> => '/desk'],
    ['home-judge', 'judge1', async (): Promise<string> => '/desk'],
    ['home-registrar', 'registrar', async (): Promise<string> => '/desk'],
    ['bench', 'measurer', async (): Promise<string> => '/desk/bench'],
    ['bench-sheet', 'measurer', async (): Promise<string> => `/desk/bench/${await entryAt('measuring', { 'e.measurer_user_id': await idOf('measurer') })}`],
    ['office', 'reviewer', async (): Promise<string> => '/desk/office'],
    ['office-file', 'reviewer', async (): Promise<string> => `/desk/office/${await entryAt('in_review')}`],
    ['office-file-returned', 'reviewer2', async (): Promise<string> => `/desk/office/${await entryAt('returned')}`],
    ['panel', 'judge1', async (): Promise<string> => '/desk/panel'],
    ['sitting', 'judge1', async (): Promise<string> => `/desk/panel/${(await sittingAt('planned')).uid}`],
    ['ballot', 'judge1', async (): Promise<string> => {
      const { uid, entry } = await sittingAt('planned')
      return `/desk/panel/${uid}/${entry}`
    }],
    ['panel-new', 'reviewer', async (): Promise<string> => '/desk/panel/new'],
    ['minutes', 'reviewer', async (): Promise<string> => `/desk/panel/${(await sittingAt('closed')).uid}/minutes`],
    ['mailbox', 'registrar', async (): Promise<string> => '/mailbox'],
  ] as const)('%s', async (name, mail, path) => {
    const page = await browser.open({ as: await signedIn(mail) })
    await visit(page, await path())
    await page.waitForLoadState('networkidle')
    await fits(page, `desk-${name}`)
  })
})

const press = (on: Page, name: string) => on.getByRole('button', { name, exact: true }).click()
/** Asks again until it is so: a machine with much to do answers late, not wrongly. */
const soon = <T>(ask: () => T) => expect.poll(ask, { timeout: 30_000 })
const stateOf = async (uid: string) => (await app.db('entries').where({ uid }).first('state'))!.state

describe('the office', () => {
  test('asks for two things, which both have to be answered; what was being typed beside it stays', async () => {
    const entry = (await app.db('entries as e').join('users as u', 'u.id', 'e.owner_user_id').where({ 'e.state': 'in_review', 'e.reviewer_user_id': await idOf('reviewer') }).whereNull('e.appealed_at').first('e.uid', 'e.owner_user_id as owner'))!
    const office = await browser.open({ as: await signedIn('reviewer') })
    await visit(office, `/desk/office/${entry.uid}`)
    await press(office, 'Decline as ineligible')
    await office.getByLabel('Reason').fill('Half a sentence')

    const ask = async (kind: string, wants: string | null, text: string) => {
      await press(office, 'Ask for something')
      await office.getByLabel('What is wanted').selectOption(kind)
      if (wants) await office.getByLabel('Which paper').selectOption(wants)
      await office.getByLabel('In your words').fill(text)
      await press(office, 'Add to the list')
      await office.getByText(text).waitFor()
    }
    await ask('paper', 'photo_left', 'A sharper photograph of the left side, please.')
    await ask('explain', null, 'Who held the tag?')
    expect(await office.getByLabel('Reason').inputValue()).toBe('Half a sentence')
    await press(office, 'Return to the entrant')
    await office.locator('form').getByRole('button', { name: 'Return to the entrant', exact: true }).click()
    await soon(() => stateOf(entry.uid)).toBe('returned')

    const entrant = await browser.open({ as: await signedInAs({ id: entry.owner }), width: 360 })
    await visit(entrant, `/desk/entries/${entry.uid}`)
    const request = (text: string) => entrant.getByRole('listitem').filter({ hasText: text }).filter({ has: entrant.getByLabel('Your answer') })
    await request('Who held the tag?').getByLabel('Your answer').fill('I did.')
    await request('Who held the tag?').getByRole('button', { name: 'Answer this request' }).click()
    await entrant.getByRole('link', { name: 'Answer: Who held the tag?' }).waitFor({ state: 'detached' })
    expect(await entrant.getByRole('button', { name: 'Send it back to the office' }).isDisabled()).toBe(true)
    const photograph = await sharp({ create: { width: 640, height: 480, channels: 3, background: '#6a7a3a' } }).jpeg().toBuffer()
    await entrant.getByLabel('Choose files').setInputFiles({ name: 'sharper.jpg', mimeType: 'image/jpeg', buffer: photograph })
    await entrant.getByRole('link', { name: 'Open sharper.jpg' }).waitFor()
    await request('A sharper photograph').getByLabel('Your answer').fill('Here it is.')
    await request('A sharper photograph').getByRole('button', { name: 'Answer this request' }).click()
    await press(entrant, 'Send it back to the office')
    await soon(() => stateOf(entry.uid)).toBe('in_review')
  })
})

describe('the panel', () => {
  test('declines on a ground and with a reason, which the entrant reads with the end of the appeal', async () => {
    const item = (await app.db('docket_items as d').join('sittings as s', 's.id', 'd.sitting_id').join('entries as e', 'e.id', 'd.entry_id')
      .where({ 's.state': 'open', 's.chair_user_id': await idOf('judge1'), 'e.owner_user_id': await idOf('entrant'), 'd.state': 'open' }).first('d.uid', 's.uid as sitting', 'e.uid as entry'))!
    for (const judge of ['judge2', 'judge4']) {
      const body = { vote: 'decline', ground: 'altered_parts', reason: 'A tine was made longer with resin.' }
      expect((await (await signedIn(judge)).put(`/api/sittings/${item.sitting}/items/${item.uid}/ballot`).set('Origin', app.url).send(body)).status).toBe(200)
    }
    const chair = await browser.openForgiving({ as: await signedIn('judge1') })
    await visit(chair, `/desk/panel/${item.sitting}/${item.entry}`)
    await chair.getByRole('radio', { name: /^Decline/ }).check()
    await chair.getByLabel('Reason').fill('The fourth point on the right was lengthened.')
    await press(chair, 'Cast this vote')
    await chair.getByRole('alert').waitFor()
    expect(await chair.getByLabel('Ground', { exact: true }).getAttribute('aria-invalid')).toBe('true')
    expect(await chair.getByLabel('Reason').inputValue()).toBe('The fourth point on the right was lengthened.')
    await chair.getByLabel('Ground', { exact: true }).selectOption('altered_parts')
    await press(chair, 'Cast this vote')
    await chair.getByText('Your vote is kept: Decline.').waitFor()

    await visit(chair, `/desk/panel/${item.sitting}`)
    await press(chair, 'Close the sitting')
    await chair.getByRole('dialog').getByRole('button', { name: 'Close the sitting' }).click()
    await soon(() => stateOf(item.entry)).toBe('declined')
    await chair.getByRole('link', { name: 'Minutes' }).click()
    await chair.waitForURL('**/minutes')
    await chair.getByText('The fourth point on the right was lengthened.').first().waitFor()

    const entrant = await browser.open({ as: await signedIn('entrant'), width: 360 })
    await visit(entrant, `/desk/entries/${item.entry}`)
    await entrant.getByText('An appeal can be made until July 2, 2026, 30 days left.').waitFor()
    await entrant.getByText('Altered, filled, cast or restored parts').first().waitFor()
    await entrant.getByRole('button', { name: 'Appeal', exact: true }).waitFor()
    const told = await app.db('notices as n').join('entries as e', 'e.id', 'n.entry_id').where({ 'e.uid': item.entry, 'n.template': 'decline_entrant' }).pluck('n.to_email')
    expect(told).toEqual([`entrant@${MAIL_DOMAIN}`])
  })
})

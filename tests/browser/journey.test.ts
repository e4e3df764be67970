import type { Locator, Page } from 'playwright-core'
import sharp from 'sharp'
import { beforeAll, expect, test } from 'vitest'
import { DEMO_ACCOUNTS, DEMO_PASSWORD, MAIL_DOMAIN } from '../../seeds/demo/accounts'
import { seedDemo } from '../../seeds/demo'
import { useApp } from '../support/app'
import { useBrowser, visit } from '../support/browser'

/** A summer day, so that last autumn's head has dried. */
const app = useApp({ at: '2026-06-02T15:00:00.000Z', worker: true })
const browser = useBrowser(app)
const mailOf = (name: string) => `${name}@${MAIL_DOMAIN}`
const nameOf = (mail: string) => DEMO_ACCOUNTS.find(account => account.mail === mail)!.name
const field = (page: Page, name: string) => page.getByLabel(name, { exact: true })
const press = (page: Page, name: string) => page.getByRole('button', { name, exact: true }).click()
/** Asks again until it is so: a machine with much to do answers late, not wrongly. */
const soon = <T>(ask: () => T) => expect.poll(ask, { timeout: 30_000 })

/** An invented head with its two sides; its net is 164 1/8. */
const LINES = [
  ['Main beam', '23 1/8', '22 7/8'], ['Brow tine (G1)', '2 4/8', '2 2/8'], ['Second point, back fork (G2)', '12 2/8', '11 6/8'],
  ['Third point, branch of the second (G3)', '8 0/8', '8 3/8'], ['Fourth point, front fork (G4)', '9 5/8', '9 4/8'],
  ['First circumference (H1)', '4 5/8', '4 4/8'], ['Second circumference (H2)', '4 1/8', '4 1/8'],
  ['Third circumference (H3)', '4 0/8', '4 0/8'], ['Fourth circumference (H4)', '3 7/8', '4 0/8'],
] as const

beforeAll(async () => {
  await seedDemo(app.db, { now: app.clock.now(), scale: 0.05 })
})

/** Signs in by the form, as a person does. */
async function signIn(mail: string): Promise<Page> {
  const page = await browser.open()
  await visit(page, '/sign-in')
  await page.getByLabel('E-mail address').fill(mailOf(mail))
  await field(page, 'Password').fill(DEMO_PASSWORD)
  await press(page, 'Sign in')
  await page.waitForURL('**/desk')
  return page
}

/** What the worker has sent about the entry since the last look, as `template to mail`, in any order. */
async function letters(entry: string, seen: Set<number>, expected: readonly string[]): Promise<void> {
  const look = async () => app.db('notices as n').join('entries as e', 'e.id', 'n.entry_id').where({ 'e.uid': entry }).select('n.id', 'n.template', 'n.to_email', 'n.state')
  await soon(async () => (await look()).filter(row => !seen.has(row.id) && row.state === 'sent').map(row => `${row.template} ${row.to_email!.split('@')[0]}`).sort()).toEqual([...expected].sort())
  for (const row of await look()) seen.add(row.id)
}

/** Opens an act of the file, fills in its form and does it. */
async function act(page: Page, name: string, fill?: (form: Locator) => Promise<unknown>): Promise<void> {
  await press(page, name)
  const send = page.getByRole('button', { name, exact: true })
  const form = page.locator('form').filter({ has: send })
  await fill?.(form)
  await form.getByRole('button', { name, exact: true }).click()
}

async function typeLines(page: Page): Promise<void> {
  await field(page, 'Inside spread').fill('22 3/8')
  for (const [label, right, left] of LINES) {
    await field(page, `${label}, the animal's right`).fill(right)
    await field(page, `${label}, the animal's left`).fill(left)
  }
}

test('from a tape on a bench to a line in the lists', { timeout: 300_000 }, async () => {
  const seen = new Set<number>()
  const photograph = await sharp({ create: { width: 640, height: 480, channels: 3, background: '#8a6a3a' } }).jpeg().toBuffer()

  // A visitor scores it roughly, and goes on as an entrant without losing a number.
  const entrant = await browser.open()
  await visit(entrant, '/measure/mule-deer-typical')
  await typeLines(entrant)
  await entrant.getByText('Rank it would take').waitFor()
  await entrant.waitForURL(/sheet=/)
  await entrant.getByRole('link', { name: 'Begin an entry with it' }).click()
  await entrant.getByLabel('E-mail address').fill(mailOf('entrant'))
  await field(entrant, 'Password').fill(DEMO_PASSWORD)
  await press(entrant, 'Sign in')
  await entrant.waitForURL(/\/desk\/entries\/new\?rough=/)
  await entrant.getByLabel('Day it was taken').fill('2025-11-08')
  await entrant.getByLabel('District').selectOption('juniper-fork')
  await entrant.getByLabel('Method').selectOption('rifle')
  await entrant.getByLabel('Sex').selectOption('male')
  await press(entrant, 'Begin')
  await entrant.waitForURL(/\/desk\/entries\/[0-9a-f-]{36}$/)
  const entry = entrant.url().split('/').at(-1)!
  const state = async () => (await app.db('entries').where({ uid: entry }).first('state'))!.state
  const { measurements } = (await app.db('sheets as s').join('entries as e', 'e.id', 's.entry_id').where({ 'e.uid': entry, 's.kind': 'rough' }).first('s.measurements'))!
  expect(typeof measurements === 'string' ? JSON.parse(measurements) : measurements).toMatchObject({ right: { mainBeam: 185, g2: 98, h4: 31 }, left: { mainBeam: 183, g2: 94, h4: 32 } })

  // Papers, statement and fee, and a measurer of the district.
  await entrant.getByLabel('With a guide').selectOption('no')
  for (const paper of ['Photograph from the front', 'Photograph of the left side', 'Photograph of the right side', 'Photograph in the field', 'Tag or licence']) {
    await entrant.getByLabel(`Add: ${paper}`).setInputFiles({ name: `${paper}.jpg`, mimeType: 'image/jpeg', buffer: photograph })
    await entrant.getByRole('link', { name: `Open ${paper}.jpg` }).waitFor()
  }
  await entrant.getByLabel('Name, typed as the signature').fill(nameOf('entrant'))
  await press(entrant, 'Sign the statement')
  await entrant.getByText(`Signed by ${nameOf('entrant')}`).waitFor()
  await entrant.getByRole('button', { name: /^Pay \$/ }).click()
  await entrant.waitForURL(/\/pay\//)
  await press(entrant, 'Pay with a card that is taken')
  await entrant.getByText('Paid. Nothing is open.').waitFor()
  await entrant.getByRole('radio', { name: nameOf('measurer') }).check()
  await press(entrant, 'Ask this measurer')
  await entrant.getByText('The measurer has been told.').waitFor()
  await letters(entry, seen, ['ask_measurer_measurer measurer', 'fee_paid entrant'])

  // The official measurer tapes it dry and signs.
  const measurer = await signIn('measurer')
  await visit(measurer, `/desk/bench/${entry}`)
  await measurer.getByLabel('It dries since it was').selectOption('taken')
  await field(measurer, 'On').fill('2025-11-08')
  await field(measurer, 'Measured on').fill('2026-06-01')
  await measurer.getByRole('radio', { name: 'whole', exact: true }).check()
  await typeLines(measurer)
  await press(measurer, 'There are none')
  await field(measurer, 'Tip to tip').fill('18 1/8')
  await field(measurer, 'Greatest spread').fill('25 6/8')
  await act(measurer, 'Sign and certify', form => form.getByLabel('Your password', { exact: true }).fill(DEMO_PASSWORD))
  await soon(state).toBe('certified')
  await letters(entry, seen, ['certify_entrant entrant'])

  // The entrant submits; the office asks something, gets its answer, and puts it before a sitting that it planned.
  await visit(entrant, `/desk/entries/${entry}`)
  await press(entrant, 'Submit to the records office')
  await soon(state).toBe('in_review')
  await letters(entry, seen, ['submit_entrant entrant', 'submit_office reviewer', 'submit_office reviewer2'])

  const office = await signIn('reviewer')
  await visit(office, `/desk/office/${entry}`)
  await press(office, 'Ask for something')
  await office.getByLabel('What is wanted').selectOption('explain')
  await office.getByLabel('In your words').fill('On which side of the ridge was it taken?')
  await press(office, 'Add to the list')
  await office.getByText('On which side of the ridge was it taken?').waitFor()
  await act(office, 'Return to the entrant')
  await soon(state).toBe('returned')
  await letters(entry, seen, ['return_entrant entrant'])

  await visit(entrant, `/desk/entries/${entry}`)
  await entrant.getByLabel('Your answer').fill('On the north side.')
  await press(entrant, 'Answer this request')
  await press(entrant, 'Send it back to the office')
  await soon(state).toBe('in_review')
  await letters(entry, seen, ['resubmit_office reviewer', 'resubmit_office reviewer2'])

  await visit(office, '/desk/panel/new')
  await office.getByLabel('Day').fill('2026-06-09')
  await office.getByLabel('Place').fill('Town hall, Juniper Fork')
  await office.getByLabel('Chair').selectOption({ label: nameOf('judge1') })
  for (const judge of ['judge2', 'judge3']) await office.getByRole('checkbox', { name: nameOf(judge) }).check()
  await press(office, 'Plan the sitting')
  await office.waitForURL(/\/desk\/panel\/[0-9a-f-]{36}$/)
  const sitting = office.url().split('/').at(-1)!

  await visit(office, `/desk/office/${entry}`)
  await press(office, 'Settled')
  for (const check of await office.getByRole('region', { name: 'Checks' }).getByRole('checkbox').all()) {
    await check.click()
    await soon(() => check.isChecked()).toBe(true)
  }
  await act(office, 'Put before the panel', form => form.getByLabel('Sitting').selectOption({ label: 'June 9, 2026, Town hall, Juniper Fork' }))
  await soon(state).toBe('at_panel')
  await letters(entry, seen, ['put_before_panel_entrant entrant', ...['judge1', 'judge2', 'judge3'].map(judge => `put_before_panel_judges ${judge}`)])

  // The panel sits: the chair opens it, three judges vote, the chair closes it.
  const item = (await app.db('docket_items as d').join('entries as e', 'e.id', 'd.entry_id').where({ 'e.uid': entry }).first('d.uid', 'd.second_measuring_due'))!
  expect(item.second_measuring_due).toBe(0)
  app.clock.set('2026-06-09T16:00:00.000Z')
  const chair = await signIn('judge1')
  await visit(chair, `/desk/panel/${sitting}`)
  await press(chair, 'Open the sitting')
  await chair.getByRole('dialog').getByRole('button', { name: 'Open the sitting' }).click()
  await press(chair, 'Close the sitting')
  await chair.getByRole('dialog').getByText(/fewer than 3 votes/).waitFor()
  await chair.getByRole('dialog').getByRole('button', { name: 'Cancel' }).click()
  for (const judge of [chair, await signIn('judge2'), await signIn('judge3')]) {
    await visit(judge, `/desk/panel/${sitting}/${entry}`)
    await judge.getByRole('radio', { name: /^Accept/ }).check()
    await press(judge, 'Cast this vote')
    await judge.getByText('Your vote is kept: Accept.').waitFor()
  }
  await visit(chair, `/desk/panel/${sitting}`)
  await press(chair, 'Close the sitting')
  await chair.getByRole('dialog').getByRole('button', { name: 'Close the sitting' }).click()
  await soon(state).toBe('accepted')
  const { record_no: recordNo } = (await app.db('records as r').join('entries as e', 'e.id', 'r.entry_id').where({ 'e.uid': entry }).first('r.record_no'))!
  await letters(entry, seen, ['accept_entrant entrant', 'accept_measurer measurer', 'accept_office reviewer', 'accept_office reviewer2'])

  // Anybody reads it, with its rank and its lines, and the letter that says so leads there.
  const visitor = await browser.open()
  await visit(visitor, `/records?category=mule-deer-typical&district=juniper-fork`)
  await visitor.getByRole('link', { name: nameOf('entrant') }).filter({ visible: true }).first().click()
  await visitor.waitForURL(`**/records/${recordNo}`)
  await visitor.getByRole('heading', { level: 1, name: nameOf('entrant') }).waitFor()
  // The score as added up by hand from the lines above, the rank as counted in the table.
  expect(await visitor.getByRole('region', { name: 'Net', exact: true }).innerText()).toMatch(/164\s*1\/8/)
  const [{ better }] = await app.db('records').where({ status: 'accepted' }).where('net16', '>', 164 * 16 + 2)
    .whereIn('class_id', app.db('records').where({ record_no: recordNo }).select('class_id')).count({ better: '*' }) as [{ better: number }]
  await visitor.getByRole('link', { name: new RegExp(`^Rank ${better + 1} of `) }).first().waitFor()
  await visit(visitor, '/mailbox')
  await visitor.getByRole('listitem').filter({ hasText: mailOf('entrant') }).getByRole('link', { name: /^In the lists/ }).click()
  await visitor.getByRole('link', { name: new RegExp(`/records/${recordNo}$`) }).click()
  await visitor.waitForURL(`**/records/${recordNo}`)
})

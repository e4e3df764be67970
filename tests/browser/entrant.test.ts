import type { Page } from 'playwright-core'
import sharp from 'sharp'
import { beforeAll, describe, expect, test } from 'vitest'
import { createEntry } from '../../server/services/entries/create'
import { useApp } from '../support/app'
import { fits, useBrowser, visit } from '../support/browser'
import type { Client } from '../support/app'
import { makePerson } from '../support/people'
import { makeScene, type Scene } from '../support/scene'

const app = useApp()
const browser = useBrowser(app)
let scene: Scene
let entrant: Client
let photograph: Buffer

beforeAll(async () => {
  scene = await makeScene(Object.assign(app.registry, { at: app.clock.set, pass: app.clock.pass }))
  const { entrant: actor } = scene.cast
  entrant = await app.signIn({ userId: actor.userId, uid: actor.uid, name: actor.name, email: actor.email, roles: [] })
  photograph = await sharp({ create: { width: 640, height: 480, channels: 3, background: '#8a6a3a' } }).jpeg().toBuffer()
})

const saved = (page: Page) => page.getByText('All is saved.').waitFor()

describe('an entrant\'s pages', () => {
  test('fit every width in light and dark, and axe finds nothing', async () => {
    const uid = await scene.entry('certified')
    await scene.entry('draft')
    const page = await browser.open({ as: entrant })
    for (const [name, address] of [['entries', '/desk/entries'], ['entry-new', '/desk/entries/new'], ['entry', `/desk/entries/${uid}`], ['claim', '/claim']] as const) {
      await visit(page, address)
      await fits(page, name)
    }
  })
})

describe('an entry by its entrant', () => {
  test('begins, is saved as it is typed, takes a photograph, is signed and paid', async () => {
    const page = await browser.open({ as: entrant })
    await visit(page, '/desk/entries/new')
    await page.getByLabel('Class', { exact: true }).selectOption('mule-deer-typical')
    await page.getByLabel('District').selectOption('alderfall')
    await page.getByRole('button', { name: 'Begin', exact: true }).click()
    await page.waitForURL(/\/desk\/entries\/[0-9a-f-]{36}$/)
    await page.getByText('You are preparing this entry.').waitFor()
    await page.getByLabel('Day it was taken').fill('2025-11-14')
    await page.getByLabel('Method').selectOption('rifle')
    await page.getByLabel('With a guide').selectOption('no')
    await page.getByLabel('Sex').selectOption('male')
    await saved(page)
    await page.getByText('Choose an official measurer').waitFor()
    await fits(page, 'entry-draft', [1440])

    await page.getByLabel('Add: Photograph from the front').setInputFiles({ name: 'front.jpg', mimeType: 'image/jpeg', buffer: photograph })
    await page.getByRole('link', { name: 'Open front.jpg' }).waitFor()
    await page.reload()
    expect(await page.getByLabel('Method').inputValue()).toBe('rifle')
    await page.getByRole('link', { name: 'Open front.jpg' }).waitFor()

    await page.getByLabel('Name, typed as the signature').fill(scene.cast.entrant.name)
    await page.getByRole('button', { name: 'Sign the statement' }).click()
    await page.getByText(`Signed by ${scene.cast.entrant.name}`).waitFor()

    await page.getByRole('button', { name: 'Pay $40.00' }).click()
    await page.waitForURL(/\/pay\//)
    await page.getByRole('button', { name: 'Leave without paying' }).click()
    await page.getByText('You left without paying').waitFor()
    await page.getByRole('button', { name: 'Pay $40.00' }).click()
    await page.waitForURL(/\/pay\//)
    await page.getByRole('button', { name: 'Pay with a card that is taken' }).click()
    await page.getByText('The payment has arrived.').waitFor()
    await page.getByText('Paid. Nothing is open.').waitFor()

    await page.getByRole('radio', { name: scene.cast.measurer.name }).check()
    await page.getByRole('button', { name: 'Ask this measurer' }).click()
    await page.getByText('The measurer has been told.').waitFor()
    await page.getByText('A measurer was asked').waitFor()
    await fits(page, 'entry-measuring', [1440])
    await visit(page, '/desk/entries')
    await page.getByText('The measurer has it').first().waitFor()
  })

  test('submits, is returned, answers and is sent back', async () => {
    const uid = await scene.entry('in_review')
    const { reviewer } = scene.cast
    const { askRequest } = await import('../../server/services/office/requests')
    await askRequest(app.registry, reviewer, uid, { kind: 'explain', text: 'On which side of the river was it taken?', wants: [] })
    await scene.move(reviewer, uid, { transition: 'return' })
    const page = await browser.open({ as: entrant, width: 320 })
    await visit(page, `/desk/entries/${uid}`)
    await page.getByRole('link', { name: 'Answer: On which side of the river was it taken?' }).waitFor()
    await fits(page, 'entry-returned', [1440])
    await page.getByLabel('Your answer').fill('On the east side.')
    await page.getByRole('button', { name: 'Answer this request' }).click()
    await page.getByRole('button', { name: 'Send it back to the office' }).click()
    await page.getByText('Sent back to the office.').first().waitFor()
    expect(await scene.state(uid)).toBe('in_review')
  })

  test('is withdrawn only by typing the word', async () => {
    const uid = await scene.entry('draft')
    const page = await browser.open({ as: entrant })
    await visit(page, `/desk/entries/${uid}`)
    await page.getByRole('button', { name: 'Withdraw the entry' }).click()
    await page.getByRole('button', { name: 'Withdraw the entry' }).click()
    await page.getByText('Type withdraw to confirm.').first().waitFor()
    expect(await scene.state(uid)).toBe('draft')
    await page.getByLabel('To confirm, type the word withdraw').fill('withdraw')
    await page.getByRole('button', { name: 'Withdraw the entry' }).click()
    await page.getByText('It was withdrawn. Nothing more happens with it.').waitFor()
    expect(await scene.state(uid)).toBe('withdrawn')
  })

  test('lays two changes of the same fact side by side, and joins others', async () => {
    const uid = await scene.entry('draft')
    const page = await browser.openForgiving({ as: entrant })
    await visit(page, `/desk/entries/${uid}`)
    const elsewhere = async (body: object) => entrant.patch(`/api/entries/${uid}`).set('If-Match', `"${await scene.version(uid)}"`).set('Origin', app.url).send(body)
    expect((await elsewhere({ method: 'crossbow' })).status).toBe(200)
    await page.getByLabel('Sex').selectOption('female')
    await saved(page)
    expect(await page.getByLabel('Method').inputValue()).toBe('crossbow')
    expect((await elsewhere({ method: 'handgun' })).status).toBe(200)
    await page.getByLabel('Method').selectOption('shotgun')
    await page.getByText('Somebody else changed this meanwhile').waitFor()
    await page.getByLabel('Mine: Shotgun').check()
    await page.getByRole('button', { name: 'Save my choice' }).click()
    await saved(page)
    expect((await app.db('entries').where({ uid }).first('method', 'sex'))).toMatchObject({ method: 'shotgun', sex: 'female' })
  })

  test('says in words why a file is not taken, and lets it be tried again', async () => {
    const uid = await scene.entry('draft')
    const page = await browser.openForgiving({ as: entrant })
    await visit(page, `/desk/entries/${uid}`)
    await page.getByLabel('Choose files').setInputFiles({ name: 'note.jpg', mimeType: 'image/jpeg', buffer: Buffer.from('not a picture') })
    await page.getByText('This is not a JPEG, PNG, WebP or PDF.').waitFor()
    await page.getByRole('button', { name: 'Leave it' }).click()
    expect(await page.getByText('note.jpg').count()).toBe(0)
  })

  test('of somebody else is not there', async () => {
    const stranger = await makePerson(app.db, app.clock.now(), [])
    const { uid } = await createEntry(app.registry, scene.cast.other, { category: 'mule-deer-typical', origin: 'hunted' })
    const page = await browser.openForgiving({ as: await app.signIn(stranger) })
    const answer = await page.goto(`/desk/entries/${uid}`)
    expect(answer?.status()).toBe(404)
  })
})

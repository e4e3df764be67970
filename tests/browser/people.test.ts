import { describe, expect, test } from 'vitest'
import { totpCode } from '../../server/services/people/totp'
import { linkFor, memberAs, PASSWORD, personWithPassword } from '../support/account'
import { useApp } from '../support/app'
import { fits, useBrowser, visit } from '../support/browser'

const app = useApp()
const browser = useBrowser(app)

describe('from a stranger to an account with a second factor', () => {
  test('sign up, confirm, set up the second factor, sign out, sign in with it', async () => {
    const email = 'wren.tarnley@ochrebasin.example'
    const page = await browser.openForgiving()
    await visit(page, '/sign-up')
    await page.getByRole('button', { name: 'Open the account' }).click()
    await page.getByText('There are 3 things to put right').waitFor()
    await page.getByLabel('Your name').fill('Wren Tarnley')
    await page.getByLabel('E-mail address').fill(email)
    await page.getByLabel('Password', { exact: true }).fill(PASSWORD)
    await page.getByRole('button', { name: 'Open the account' }).click()
    await page.getByText(`A letter is on its way to ${email}`).waitFor()

    const { id, uid } = (await app.db('users').where({ email }).first('id', 'uid'))!
    const token = await linkFor(app, 'confirm_email', { userId: id, email })
    await visit(page, `/confirm?token=${token}`)
    await page.getByLabel('Password', { exact: true }).fill('not what I chose')
    await page.getByRole('button', { name: 'Confirm and sign in' }).click()
    await page.getByText('That is not your password.').first().waitFor()
    await page.getByLabel('Password', { exact: true }).fill(PASSWORD)
    await page.getByRole('button', { name: 'Confirm and sign in' }).click()
    await page.waitForURL('**/desk')
    expect(uid).toBeTruthy()

    await visit(page, '/account')
    await page.getByRole('button', { name: 'Set it up' }).click()
    await page.locator('#factor-password').fill(PASSWORD)
    await page.getByRole('button', { name: 'Set it up' }).click()
    await page.getByRole('img', { name: 'QR code for an authenticator app' }).waitFor()
    const secret = (await page.locator('[data-totp-secret]').textContent())!.replace(/\s/g, '')
    await page.getByLabel('Then enter the code that it shows').fill(totpCode(secret, app.clock.now()))
    await page.getByRole('button', { name: 'Switch it on' }).click()
    await page.getByText('Your recovery codes', { exact: true }).waitFor()
    expect(await page.locator('[data-recovery-code]').count()).toBe(10)

    await page.getByRole('button', { name: 'Sign out' }).click()
    await page.waitForURL(`${app.url}/`)
    await page.goto('/account')
    await page.waitForURL('**/sign-in?callbackUrl=/account')
    await visit(page, page.url())
    await page.getByLabel('E-mail address').fill(email)
    await page.getByLabel('Password', { exact: true }).fill(PASSWORD)
    await page.getByRole('button', { name: 'Sign in', exact: true }).click()
    app.clock.set(new Date(app.clock.now().getTime() + 30_000))
    await page.getByLabel('Code from your authenticator').fill(totpCode(secret, app.clock.now()))
    await page.getByRole('button', { name: 'Sign in', exact: true }).click()
    await page.waitForURL('**/account')
    await page.getByText('Switched on.').waitFor()
  })

  test('a wrong password keeps what was typed and says so once', async () => {
    const person = await personWithPassword(app)
    const page = await browser.openForgiving()
    await visit(page, '/sign-in')
    await page.getByLabel('E-mail address').fill(person.email)
    await page.getByLabel('Password', { exact: true }).fill('wrong')
    await page.getByRole('button', { name: 'Sign in', exact: true }).click()
    await page.getByText('That e-mail address and password do not go together.').waitFor()
    expect(await page.getByLabel('E-mail address').inputValue()).toBe(person.email)
  })
})

describe('a registrar at work', () => {
  test('invites somebody, gives and takes a role', async () => {
    const registrar = await memberAs(app, ['registrar'])
    const person = await personWithPassword(app, [], { name: 'Sorrel Ashgate' })
    const page = await browser.open({ as: registrar })
    await visit(page, '/desk/registrar/people')
    await page.getByRole('button', { name: 'Invite somebody' }).click()
    const dialog = page.getByRole('dialog')
    await dialog.getByLabel('Name').fill('Perrin Moss')
    await dialog.getByLabel('E-mail').fill('perrin.moss@ochrebasin.example')
    await dialog.getByLabel('Role').selectOption('measurer')
    await dialog.locator('#invite-password').fill(PASSWORD)
    await dialog.locator('#invite-code').waitFor()
    await dialog.getByRole('button', { name: 'Send the invitation' }).click()
    await page.getByText('The invitation to perrin.moss@ochrebasin.example is on its way.').waitFor()
    await page.getByText('invited, not accepted yet').filter({ visible: true }).first().waitFor()

    await visit(page, `/desk/registrar/people/${person.uid}`)
    await page.getByLabel('Give a role').selectOption('shop')
    await page.getByRole('button', { name: 'Give this role' }).click()
    await page.locator('#role-password').fill(PASSWORD)
    await page.getByRole('dialog').getByRole('button', { name: 'Give this role' }).click()
    await page.getByText('Sorrel Ashgate is now also: Shop.').waitFor()
    await page.getByRole('button', { name: 'Take away: Shop' }).click()
    await page.locator('#role-password').fill(PASSWORD)
    await page.getByRole('dialog').getByRole('button', { name: 'Take away' }).click()
    await page.getByText('Sorrel Ashgate is no longer: Shop.').waitFor()
  })
})

describe('pages of people and accounts', () => {
  test.each(['/sign-in', '/sign-up', '/reset', '/confirm?token=x', '/invite?token=x'])('%s fits every width in light and dark, and axe finds nothing', async (address) => {
    const page = await browser.openForgiving()
    await visit(page, address)
    await page.waitForLoadState('networkidle')
    await fits(page, `people${address.replace(/\W+/g, '-')}`)
  })

  test.each(['/account', '/desk/registrar/people', 'person'])('%s fits every width in light and dark, and axe finds nothing', async (name) => {
    const registrar = await memberAs(app, ['registrar'])
    const person = await personWithPassword(app, ['measurer'], { name: 'Bartholomew Featherstonehaugh-Cholmondeley of the Upper Reaches' })
    const made = await registrar.post(`/api/people/${person.uid}/accreditations`).send({ number: `M-${person.userId}`, validFrom: '2026-01-01', validTo: '2028-12-31', species: ['elk', 'moose'] })
    expect(made.status).toBe(201)
    const page = await browser.open({ as: registrar })
    await visit(page, name === 'person' ? `/desk/registrar/people/${person.uid}` : name)
    await fits(page, `people-${name.replace(/\W+/g, '-')}`)
  })
})

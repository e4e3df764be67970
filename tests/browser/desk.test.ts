import { beforeAll, describe, test } from 'vitest'
import { seedDemo } from '../../seeds/demo'
import { MAIL_DOMAIN } from '../../seeds/demo/accounts'
import { useApp, type Client } from '../support/app'
import { fits, useBrowser, visit } from '../support/browser'

const app = useApp({ at: '2026-06-02T15:00:00.000Z' })
const browser = useBrowser(app)

beforeAll(async () => {
  await seedDemo(app.db, { now: app.clock.now(), scale: 0.05, files: app.registry.storage })
})

async function signedIn(mail: string): Promise<Client> {
  const user = (await app.db('users').where({ email: `${mail}@${MAIL_DOMAIN}` }).first('id', 'uid', 'name', 'email'))!
  return app.signIn({ userId: user.id, uid: user.uid, name: user.name, email: user.email, roles: [] })
}

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

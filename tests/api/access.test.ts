import path from 'node:path'
import { readFileSync } from 'node:fs'
import { randomUUID } from 'node:crypto'
import { beforeAll, describe, expect, test } from 'vitest'
import { ROLES, type ActiveActor, type Role } from '../../shared/domain/access/roles'
import { openSitting } from '../../server/services/panel/sittings'
import { sqlTime } from '../../db/time'
import { filesOf, ROOT } from '../meta/files'
import { PAGES, PARTIES, PARTY_ROWS, ROUTES, type Asked, type Party, type PartyRow, type Who } from '../support/accessTable'
import { useApp, type Client } from '../support/app'
import { DEER, makeScene, type Scene } from '../support/scene'
import type { TestRegistry } from '../support/registry'

const app = useApp()
const METHODS = ['get', 'post', 'put', 'patch', 'delete'] as const
const NOBODY = '01890000-0000-7000-8000-000000000000'

/** `GET /api/people/[id]` of server/api/people/[id]/index.get.ts */
function keyOf(file: string): string {
  const [, address = '', method] = /^server\/(?:routes\/|(?=api\/))(.+?)(?:\.(get|post|put|patch|delete))?\.ts$/.exec(file)!
  return `${method?.toUpperCase() ?? 'ANY'} /${address.replace(/(?:^|\/)index$/, '')}`
}
const pageOf = (file: string) => `/${file.replace(/^pages\//, '').replace(/\.vue$/, '').replace(/(?:^|\/)index$/, '')}`

const routeFiles = filesOf(['.ts']).filter(file => /^server\/(api|routes)\//.test(file))
const pageFiles = filesOf(['.vue']).filter(file => file.startsWith('pages/'))

const SAMPLES: Readonly<Record<string, string>> = { '[role]': 'judge', '[check]': 'sheet', '[recordNo]': '1', '[category]': 'mule-deer-typical' }
const sample = (address: string) => address.replace(/\[\.\.\.\]/, 'csrf').replace(/\[\w+\]/g, part => SAMPLES[part] ?? NOBODY)

function ask(client: Client, route: string, address: string, body: object = {}, headers: Readonly<Record<string, string>> = {}) {
  const method = METHODS.find(one => one === route.split(' ')[0]!.toLowerCase()) ?? 'get'
  const request = client[method](address).set(headers)
  return method === 'get' ? request : request.send(body)
}

const letsIn = (who: Who, role: Role | null) => who === 'anyone' || (role !== null && (who === 'signedIn' || who.includes(role)))

describe('the table', () => {
  test('names every route of the program, and no other', () => {
    expect(routeFiles.map(keyOf).sort()).toEqual(Object.keys(ROUTES).sort())
  })

  test('names every page of the program, and no other', () => {
    expect(pageFiles.map(pageOf).sort()).toEqual(Object.keys(PAGES).sort())
  })

  test.each(pageFiles)('%s says of itself what the table says', (file) => {
    const said = /access:\s*('public'|'signedIn'|\[[^\]]*\])/.exec(readFileSync(path.join(ROOT, file), 'utf8'))?.[1] ?? ''
    const who = said === '\'public\'' ? 'anyone' : said === '\'signedIn\'' ? 'signedIn' : [...said.matchAll(/'(\w+)'/g)].map(([, role]) => role).sort()
    const expected = PAGES[pageOf(file)]!
    expect(who).toEqual(typeof expected === 'string' ? expected : [...expected].sort())
  })
})

describe('every route with every role', () => {
  const clients = new Map<Role | null, Client>()
  beforeAll(async () => {
    clients.set(null, app.visitor)
    for (const role of ROLES) clients.set(role, await app.signInAs(role))
  })

  test.each(Object.entries(ROUTES))('%s', async (route, who) => {
    const seen: Record<string, string> = {}
    const wanted: Record<string, string> = {}
    for (const [role, client] of clients) {
      const { status, body, headers } = await ask(client, route, sample(route.split(' ')[1]!))
      const may = letsIn(who, role)
      wanted[role ?? 'visitor'] = may ? 'in' : role === null ? '401' : '403'
      // Nothing is there under these ids, so whoever is let in hears that, or what is wrong with an empty body.
      seen[role ?? 'visitor'] = status === 401 || (status === 403 && (who !== 'signedIn')) ? String(status) : 'in'
      if (!may) expect(headers['content-type'], `${role} ${status} ${JSON.stringify(body)}`).toMatch(/^application\/problem\+json/)
      expect(status, `${role} ${JSON.stringify(body)}`).not.toBe(500)
      if (who !== 'anyone') expect(headers['cache-control']).toBe('no-store')
    }
    expect(seen).toEqual(wanted)
  })
})

describe('every page with every role', () => {
  test.each(Object.entries(PAGES))('%s', async (page, who) => {
    const address = sample(page)
    for (const role of [null, ...ROLES]) {
      const client = role === null ? app.visitor : await app.signInAs(role)
      const { status, headers } = await client.get(address)
      const said = `${role ?? 'visitor'}: ${status} ${headers.location ?? ''}`
      if (letsIn(who, role)) expect([200, 404], said).toContain(status)
      else if (role === null) expect([status, headers.location], said).toEqual([302, expect.stringMatching(/^\/sign-in\?callbackUrl=/)])
      else expect(status, said).toBe(404)
      if (who !== 'anyone') expect(headers['cache-control'], said).toMatch(/no-store/)
    }
  })
})

describe('entries by how somebody stands to them', () => {
  let scene: Scene
  let staked: ActiveActor
  const clients = new Map<Party, Client>()

  beforeAll(async () => {
    scene = await makeScene(app.registry as TestRegistry)
    const { cast } = scene
    staked = await scene.person(['measurer', 'reviewer', 'judge', 'registrar', 'shop'])
    const people: Record<Exclude<Party, 'visitor'>, ActiveActor> = {
      owner: cast.entrant, stranger: cast.other, shop: cast.shop, assignedMeasurer: cast.measurer, otherMeasurer: cast.measurer2,
      reviewer: cast.reviewer, registrar: cast.registrar, chair: cast.judges[0]!, judge: cast.judges[1]!, judgeElsewhere: cast.judges[6]!, staked,
    }
    clients.set('visitor', app.visitor)
    for (const [party, person] of Object.entries(people)) clients.set(party as Party, await app.signIn(person))
  })

  async function prepare({ stage, sittingOpen = false }: PartyRow): Promise<Asked> {
    const { db } = app
    const sitting = await scene.sitting(false, [...scene.cast.judges.slice(0, 6), staked])
    const entry = await scene.entry(stage, { sitting, measurements: DEER })
    if (sittingOpen) await openSitting(app.registry, scene.cast.judges[0]!, sitting)
    const { id } = (await db('entries').where({ uid: entry }).first('id'))!
    await db('entry_people').insert({ uid: randomUUID(), entry_id: id, part: 'guide', user_id: staked.userId, name: staked.name, name_key: 'guide', created_at: sqlTime(app.clock.now()) })
    if (stage === 'certified') {
      await scene.papers(entry, ['photo_front'])
      await db('documents').where({ entry_id: id }).update({ uploaded_by: scene.cast.entrant.userId })
    }
    const document = (await db('documents').where({ entry_id: id }).first('uid'))?.uid ?? NOBODY
    const item = stage === 'at_panel' ? (await scene.itemOf(entry)).uid : NOBODY
    return { entry, sitting, item, document, request: NOBODY, version: await scene.version(entry) }
  }

  const address = (route: string, asked: Asked) => route.split(' ')[1]!
    .replace('/sittings/[id]', `/sittings/${asked.sitting}`).replace('/documents/[id]', `/documents/${asked.document}`)
    .replace('[item]', asked.item).replace('[request]', asked.request).replace('[check]', 'sheet').replace('[id]', asked.entry)

  test.each(PARTY_ROWS.map(row => [`${row.route}${row.act ? ` ${row.act}` : ''} (${row.stage})`, row] as const))('%s', async (_title, row) => {
    const asked = await prepare(row)
    const heard: string[] = []
    const letIn: Party[] = []
    // Who must be kept out asks first, so that what the others do cannot be the reason.
    for (const party of [...PARTIES].sort((a, b) => Number(row.may.includes(a)) - Number(row.may.includes(b)))) {
      const { status, body } = await ask(clients.get(party)!, row.route, `${address(row.route, asked)}${row.query ?? ''}`, row.body?.(asked), row.headers?.(asked))
      heard.push(`${party} ${status} ${body?.code ?? ''}`)
      expect(status, heard.join('\n')).not.toBe(500)
      if (![401, 403, 404].includes(status) && !(row.refusal && body?.code === row.refusal)) letIn.push(party)
    }
    expect([...letIn].sort(), heard.join('\n')).toEqual([...row.may].sort())
  })

  test('a stake closes the file on the desk: nothing of the people, the papers, the sheet or its figures is told', async () => {
    const asked = await prepare({ route: '', stage: 'in_review', may: [] })
    const { status, body } = await ask(clients.get('staked')!, 'GET /api/desk/files/[id]', `/api/desk/files/${asked.entry}?as=office`)
    expect([status, body.viewer.stakes]).toEqual([200, ['part.guide']])
    expect(body).toMatchObject({ people: [], papers: [], sheets: [], requests: [], checks: [], events: [], doubles: [], statement: null, net: null, gross: null })
  })
})

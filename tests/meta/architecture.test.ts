import { existsSync, readFileSync, statSync } from 'node:fs'
import path from 'node:path'
import { describe, expect, test } from 'vitest'
import { filesOf, ROOT } from './files'

interface Import {
  readonly from: string
  /** path from the root for a file of ours, else the package's name */
  readonly to: string
}

const IMPORT = /(?:^|[\s;])(?:import|export)\s(?:[^'"`;]*?\sfrom\s)?\s*['"]([^'"]+)['"]|import\(\s*['"]([^'"]+)['"]\s*\)/g

/** Every import of the program, followed to the file that it means. */
const imports: readonly Import[] = filesOf(['.ts', '.vue', '.mjs']).flatMap(from =>
  [...readFileSync(path.join(ROOT, from), 'utf8').matchAll(IMPORT)].map(([, one, other]) => ({ from, to: resolve(from, (one ?? other)!) })))

function resolve(from: string, wanted: string): string {
  const target = wanted.startsWith('#shared/')
    ? `shared/${wanted.slice('#shared/'.length)}`
    : /^(~~?|@@?)\//.test(wanted)
      ? wanted.replace(/^(~~?|@@?)\//, '')
      : wanted.startsWith('.') ? path.join(path.dirname(from), wanted) : null
  if (target === null) return wanted.replace(/^((?:@[^/]+\/)?[^/]+).*$/, '$1')
  const found = [target, `${target}.ts`, `${target}.mjs`, `${target}.vue`, `${target}/index.ts`].find(file => existsSync(path.join(ROOT, file)) && statSync(path.join(ROOT, file)).isFile())
  return (found ?? target).split(path.sep).join('/')
}

const BROWSER = /^(?:(?:pages|layouts|components|composables|stores|plugins|middleware|utils)\/|app\.vue|error\.vue)/

/** [who, what may not be imported, why] as in the table of who may import whom. */
const FORBIDDEN: readonly (readonly [RegExp, RegExp, string])[] = [
  [/^shared\/domain\//, /^(?!shared\/domain\/)/, 'the domain imports itself alone'],
  [/^shared\/schemas\//, /^(?!shared\/|zod$)/, 'schemas import the domain and zod'],
  [/^shared\//, /^(?:server|db|seeds|scripts)\//, 'what both sides share knows neither'],
  [/^components\/base\//, /^(?:components\/(?!base\/)|composables|stores|shared|server|db|utils)\//, 'base components import nothing of ours'],
  [BROWSER, /^(?:server|db|seeds|scripts)\//, 'what runs in the browser never imports the server'],
  [BROWSER, /^(?:knex|mysql2|nodemailer|pino|stripe|sharp)$/, 'what runs in the browser never imports a server\'s library'],
  [/^server\/(?:api|routes)\//, /^(?:db\/|server\/repositories\/|knex$|mysql2$)/, 'routes call services, read-models and presenters'],
  [/^server\/(?:services|repositories|read-models|presenters)\//, /^(?:h3|nitropack|#imports)$/, 'only routes and utils know of requests'],
  [/^server\/(?:repositories|read-models)\//, /^server\/(?:services|api|routes)\//, 'SQL does not call use cases'],
  [/^server\/services\//, /^server\/(?:api|routes)\//, 'use cases do not call routes'],
  [/^db\/migrations\/\d/, /^(?!db\/columns\.ts$|knex$)/, 'a migration is one statement and small helpers'],
  [/^db\//, /^(?:server|seeds|scripts)\//, 'db/ is below everything'],
  [/^(?!tests\/|vitest|stryker|scripts\/)/, /^tests\//, 'nothing imports tests'],
]

describe('who may import whom', () => {
  test('there is something to look at', () => {
    expect(imports.length).toBeGreaterThan(500)
    expect(imports.filter(({ to }) => to.startsWith('shared/')).length).toBeGreaterThan(50)
  })

  test.each(FORBIDDEN)('%s', (who, what, why) => {
    const found = imports.filter(({ from, to }) => who.test(from) && what.test(to))
    expect(found.map(({ from, to }) => `${from} → ${to}`), why).toEqual([])
  })
})

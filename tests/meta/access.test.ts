import { readFileSync } from 'node:fs'
import path from 'node:path'
import { describe, expect, test } from 'vitest'
import { ROLES } from '../../shared/domain/access/roles'
import { filesOf, ROOT } from './files'

const read = (file: string) => readFileSync(path.join(ROOT, file), 'utf8')
const pages = filesOf(['.vue']).filter(file => file.startsWith('pages/'))
const routes = filesOf(['.ts']).filter(file => /^server\/(api|routes)\//.test(file) && !path.basename(file).startsWith('_'))

/** Routes of packages, with formats of their own; they declare no access with defineRoute. */
const OWN_FORMAT = new Set(['server/api/auth/[...].ts'])

describe('every page says who may open it, and in which layout', () => {
  test.each(pages)('%s', (file) => {
    const meta = /definePageMeta\(\{([\s\S]*?)\}\)/.exec(read(file))?.[1]
    expect(meta, 'definePageMeta').toBeDefined()
    const access = /access:\s*('public'|'signedIn'|\[[^\]]*\])/.exec(meta!)?.[1]
    expect(access, 'access').toBeDefined()
    for (const [, role] of access!.startsWith('[') ? access!.matchAll(/'(\w+)'/g) : []) expect(ROLES).toContain(role)
    expect(meta).toMatch(/layout:/)
    if (file.startsWith('pages/desk/')) expect(access).not.toBe('\'public\'')
  })
})

describe('every route says who may call it', () => {
  test.each(routes.filter(file => !OWN_FORMAT.has(file)))('%s', (file) => {
    expect(read(file)).toMatch(/\baccess:\s*(?:'public'|'signedIn'|\{|[A-Z_]+\b)/)
  })
})

import { existsSync, readFileSync } from 'node:fs'
import path from 'node:path'
import { beforeAll, expect, test } from 'vitest'
import { ensureBuild } from '../../scripts/build.mjs'
import { filesUnder } from '../../scripts/lib/sources.mjs'
import { ROOT } from './files'

beforeAll(async () => {
  await ensureBuild()
}, 600_000)

/** Words that stand in code of the server and nowhere else. If one turns up in what browsers load, so has that code. */
const MARKS = [
  ['server/config.ts', 'sessions and second factors are sealed with it'],
  ['db/connection.ts', 'innodb_lock_wait_timeout'],
  ['server/services/people/passwords.ts', 'argon2'],
  ['server/mail/transport.ts', 'Auto-Submitted'],
] as const

test.each(MARKS)('the mark of %s is in the server and not in the public bundle', (file, mark) => {
  expect(readFileSync(path.join(ROOT, file), 'utf8')).toContain(mark)
  const bundle = filesUnder(path.join(ROOT, '.output/public')).filter(name => /\.(?:m?js|html|json|css)$/.test(name))
  expect(bundle.length).toBeGreaterThan(5)
  expect(bundle.filter(name => readFileSync(name, 'utf8').includes(mark)).map(name => path.relative(ROOT, name))).toEqual([])
})

test('no source map of the server lies in the public folder', () => {
  expect(existsSync(path.join(ROOT, '.output/public'))).toBe(true)
  expect(filesUnder(path.join(ROOT, '.output/public')).filter(name => name.endsWith('.map'))).toEqual([])
})

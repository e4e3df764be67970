import { describe, expect, test } from 'vitest'
import { readEnvironment } from '../../scripts/lib/environment.mjs'

const read = (env: Record<string, string>) => readEnvironment(env, '/srv/hartroll')

describe('what the environment asks for', () => {
  test('nothing said is a demo on loopback with a database of its own', () => {
    expect(read({})).toEqual({ mode: 'demo', host: '127.0.0.1', port: 3000, dataDir: '/srv/hartroll/.data', databaseUrl: null, databasePort: undefined, secret: null, publicUrl: null })
  })

  test.each([
    [{ DATABASE_URL: 'mysql://u:p@db.example/h', HARTROLL_SECRET: 'x'.repeat(32) }, 'production'],
    [{ HOST: '0.0.0.0', HARTROLL_SECRET: 'x'.repeat(32) }, 'production'],
    [{ HOST: '0.0.0.0', HARTROLL_MODE: 'demo' }, 'demo'],
    [{ HARTROLL_MODE: 'production', HARTROLL_SECRET: 'x'.repeat(32) }, 'production'],
  ] as const)('%o is %s', (env, mode) => {
    expect(read(env).mode).toBe(mode)
  })

  test.each([
    [{ PORT: 'eighty' }, /^PORT is "eighty"; it must be a number from 1 to 65535$/],
    [{ PORT: '70000' }, /^PORT is "70000"/],
    [{ HARTROLL_DB_PORT: '-1' }, /^HARTROLL_DB_PORT is "-1"/],
    [{ PORT: '4000', HARTROLL_DB_PORT: '4000' }, /both 4000/],
    [{ HARTROLL_MODE: 'test' }, /^HARTROLL_MODE is "test"; it must be demo or production$/],
    [{ HARTROLL_MODE: 'production' }, /^HARTROLL_SECRET is missing/],
    [{ HARTROLL_SECRET: 'short' }, /^HARTROLL_SECRET has 5 characters; take 32 or more$/],
    [{ DATABASE_URL: 'db.example' }, /^DATABASE_URL is not an address/],
    [{ DATABASE_URL: 'postgres://u:p@h/d' }, /^DATABASE_URL begins with postgres:\/\//],
    [{ DATABASE_URL: 'mysql://u:p@h' }, /^DATABASE_URL names no database/],
    [{ DATABASE_URL: 'mysql://u:p@h/d', HARTROLL_MODE: 'demo' }, /^HARTROLL_MODE=demo asks for demo data, which is never put into a database that Hartroll did not make/],
  ] as const)('%o is refused in one line', (env, line) => {
    expect(() => read(env)).toThrow(line)
    try {
      read(env)
    }
    catch (error) {
      expect((error as Error).message).not.toMatch(/\n|:p@/)
    }
  })
})

import { describe, expect, it } from 'vitest'
import { ConfigError, readConfig } from '../../../server/config'

const SECRET = 'x'.repeat(32)
const base = { DATABASE_URL: 'mysql://u:p@127.0.0.1:3306/h', HARTROLL_SECRET: SECRET }

const refusal = (env: Record<string, string | undefined>) => {
  try {
    readConfig(env)
  }
  catch (error) {
    if (error instanceof ConfigError) return error.message
    throw error
  }
  return null
}

describe('the environment', () => {
  it('is a demo on a database of its own and on loopback', () => {
    expect(readConfig({ ...base, HARTROLL_OWN_DATABASE: '1' }).mode).toBe('demo')
    expect(readConfig({ ...base, HARTROLL_OWN_DATABASE: '1', HOST: 'localhost' }).mode).toBe('demo')
  })

  it('is production with somebody else’s database or an address off loopback, unless said', () => {
    expect(readConfig(base).mode).toBe('production')
    expect(readConfig({ ...base, HARTROLL_OWN_DATABASE: '1', HOST: '0.0.0.0' }).mode).toBe('production')
    expect(readConfig({ ...base, HARTROLL_MODE: 'demo' }).mode).toBe('demo')
  })

  it.each([
    [{ ...base, HARTROLL_MODE: 'fast' }, 'HARTROLL_MODE'],
    [{ HARTROLL_SECRET: SECRET }, 'DATABASE_URL'],
    [{ ...base, DATABASE_URL: 'not a url' }, 'DATABASE_URL'],
    [{ ...base, DATABASE_URL: 'postgres://h/db' }, 'DATABASE_URL'],
    [{ ...base, HARTROLL_SECRET: undefined }, 'HARTROLL_SECRET'],
    [{ ...base, HARTROLL_SECRET: 'x'.repeat(31) }, 'HARTROLL_SECRET'],
    [{ ...base, HARTROLL_PUBLIC_URL: 'ftp://h' }, 'HARTROLL_PUBLIC_URL'],
    [{ ...base, HARTROLL_TRUSTED_PROXIES: '-1' }, 'HARTROLL_TRUSTED_PROXIES'],
    [{ ...base, HARTROLL_TRUSTED_PROXIES: '1.5' }, 'HARTROLL_TRUSTED_PROXIES'],
    [{ ...base, SMTP_URL: 'http://mail' }, 'SMTP_URL'],
    [{ ...base, STRIPE_SECRET_KEY: 'sk' }, 'STRIPE_WEBHOOK_SECRET'],
    [{ ...base, DOCUMENTS_S3_BUCKET: 'b' }, 'DOCUMENTS_S3_ENDPOINT'],
    [{ ...base, DOCUMENTS_S3_BUCKET: 'b', DOCUMENTS_S3_ENDPOINT: 'files.example' }, 'DOCUMENTS_S3_ENDPOINT'],
    [{ ...base, DOCUMENTS_S3_BUCKET: 'b', DOCUMENTS_S3_ENDPOINT: 'https://files.example' }, 'DOCUMENTS_S3_ACCESS_KEY_ID'],
    [{ ...base, HARTROLL_SCANNER: 'clamd' }, 'HARTROLL_SCANNER'],
    [{ ...base, HARTROLL_TESTING: '1' }, 'HARTROLL_TESTING'],
  ] as [Record<string, string | undefined>, string][])('refuses a wrong value with one line that names it (%#)', (env, name) => {
    const line = refusal(env)
    expect(line).toContain(name)
    expect(line).not.toContain('\n')
  })

  it('makes links from the public address without a slash at its end', () => {
    expect(readConfig({ ...base, HARTROLL_PUBLIC_URL: 'https://lists.example/' }).publicUrl).toBe('https://lists.example')
    expect(readConfig({ ...base, PORT: '3456' }).publicUrl).toBe('http://127.0.0.1:3456')
  })
})

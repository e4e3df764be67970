import { beforeAll, afterAll } from 'vitest'
import pino from 'pino'
import { createRegistry, type Registry } from '../../server/composition'
import { readConfig } from '../../server/config'
import { useDatabase } from './database'

export interface TestRegistry extends Registry {
  /** Moves the registry's clock; it stands still until it is moved again. */
  at(to: Date | string): void
  pass(days: number): void
}

/** The registry of the services, on a database of its own, without a server. For the tests of one file. */
export function useRegistry(start = '2026-03-02T15:00:00.000Z'): { readonly registry: TestRegistry } {
  const database = useDatabase()
  let registry: TestRegistry | undefined
  beforeAll(() => {
    let now = new Date(start)
    const made = createRegistry(readConfig({
      DATABASE_URL: database.url, HARTROLL_OWN_DATABASE: '1', HARTROLL_MODE: 'demo', HARTROLL_TESTING: '1',
      HARTROLL_SECRET: 'a secret of the tests alone, long enough to be taken', HARTROLL_PUBLIC_URL: 'http://127.0.0.1:3130',
    }), { clock: { now: () => new Date(now) }, log: pino({ level: 'silent' }) })
    registry = Object.assign(made, {
      at: (to: Date | string) => { now = new Date(to) },
      pass: (days: number) => { now = new Date(now.getTime() + days * 86_400_000) },
    })
  })
  afterAll(async () => {
    await registry?.close()
  })
  return {
    get registry() {
      if (!registry) throw new Error('The registry is there from beforeAll on')
      return registry
    },
  }
}

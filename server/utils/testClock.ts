import { readFileSync } from 'node:fs'
import { systemClock, type Clock } from '../clock'

/**
 * A clock that tests set through the file named in `HARTROLL_TEST_CLOCK` (an ISO time), so that every process of one
 * test agrees. The configuration refuses testing in production.
 */
export function testClock(): Clock {
  const file = process.env.HARTROLL_TEST_CLOCK
  if (!file) return systemClock
  return {
    now() {
      try {
        const text = readFileSync(file, 'utf8').trim()
        return text ? new Date(text) : new Date()
      }
      catch {
        return new Date()
      }
    },
  }
}

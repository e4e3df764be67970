const FIRST_MS = 15_000
const LONGEST_MS = 6 * 3_600_000

/**
 * How long to wait after a failed attempt: 15 s, doubling to 6 h, each up to a fifth longer so that what failed
 * together does not come back together.
 *
 * @param attempt from 1
 * @param random from 0 to 1
 * @returns milliseconds
 */
export function backoff(attempt: number, random: number = Math.random()): number {
  return Math.round(Math.min(LONGEST_MS, FIRST_MS * 2 ** (attempt - 1)) * (1 + random / 5))
}

import { uuidv7 } from '#shared/uuid'

/** A stream of numbers that is the same for the same label, on every machine. */
export interface Random {
  /** uniform in [0, 1) */
  next: () => number
  /** whole number from `from` to `to`, both included */
  whole: (from: number, to: number) => number
  chance: (share: number) => boolean
  pick: <T>(list: readonly T[]) => T
  /** one of the keys, as often as its weight says */
  weighted: <K extends string>(weights: Readonly<Partial<Record<K, number>>>) => K
  /** normal with mean 0 and standard deviation 1, cut at three */
  normal: () => number
  /** exponential with mean 1 */
  exponential: () => number
  bytes: (length: number) => Uint8Array
  /** a stream of its own, so that drawing more here changes nothing there */
  fork: (label: string) => Random
}

/** FNV-1a over the label's UTF-16 units, 32 bits. */
function hash(label: string): number {
  let value = 0x811C9DC5
  for (let place = 0; place < label.length; place++) {
    value ^= label.charCodeAt(place)
    value = Math.imul(value, 0x01000193)
  }
  return value >>> 0
}

/** sfc32 (Chris Doty-Humphrey's small fast counting generator), seeded by the label. */
export function randomFor(label: string): Random {
  let a = hash(label)
  let b = hash(`${label}/b`)
  let c = hash(`${label}/c`)
  let counter = 1
  const word = (): number => {
    const sum = (((a + b) | 0) + counter) | 0
    counter = (counter + 1) | 0
    a = b ^ (b >>> 9)
    b = (c + (c << 3)) | 0
    c = ((c << 21) | (c >>> 11)) + sum | 0
    return sum >>> 0
  }
  for (let warmUp = 0; warmUp < 12; warmUp++) word()

  const next = () => word() / 4294967296
  const random: Random = {
    next,
    whole: (from, to) => from + Math.floor(next() * (to - from + 1)),
    chance: share => next() < share,
    pick: list => list[Math.floor(next() * list.length)]!,
    weighted: (weights) => {
      const entries = Object.entries(weights) as [keyof typeof weights, number][]
      let left = next() * entries.reduce((sum, [, weight]) => sum + weight, 0)
      for (const [key, weight] of entries) {
        left -= weight
        if (left < 0) return key as never
      }
      return entries.at(-1)![0] as never
    },
    normal: () => {
      for (;;) {
        const value = Math.sqrt(-2 * Math.log(1 - next())) * Math.cos(2 * Math.PI * next())
        if (Math.abs(value) <= 3) return value
      }
    },
    exponential: () => -Math.log(1 - next()),
    bytes: length => Uint8Array.from({ length }, () => word() >>> 24),
    fork: child => randomFor(`${label}/${child}`),
  }
  return random
}

/** A UUIDv7 (RFC 9562) for something that began then. */
export const uidAt = (at: Date, random: Random): string => uuidv7(at.getTime(), random.bytes(16))

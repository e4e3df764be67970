import type { Day } from './dates'

/** How many records of a list stand at one net, in sixteenths of an inch. */
export interface NetCount {
  readonly net16: number
  readonly n: number
}

export interface Standing {
  /** 1 for the highest net; equal nets share it and the next is skipped */
  readonly rank: number
  /** records of the list at exactly this net */
  readonly sharedBy: number
  readonly total: number
  /** records with a lower net */
  readonly below: number
}

/**
 * Where a net stands, or would stand, in a list kept as counts by net. Order of the counts does not matter.
 * `sharedBy` is 0 for a net that the list does not hold.
 */
export function standingOf(counts: readonly NetCount[], net16: number): Standing {
  let above = 0
  let sharedBy = 0
  let below = 0
  for (const count of counts) {
    if (count.net16 > net16) above += count.n
    else if (count.net16 === net16) sharedBy += count.n
    else below += count.n
  }
  return { rank: above + 1, sharedBy, total: above + sharedBy + below, below }
}

/** A list by its nets, made once and asked often. */
export interface Standings {
  readonly total: number
  /** Where a net stands that the list holds; for another one `standingOf` is asked. */
  of(net16: number): Standing | undefined
  /** records with at least this net */
  atLeast(net16: number): number
}

/** Every standing of a list kept as counts by net. Each net may be given once. */
export function standingsOf(counts: readonly NetCount[]): Standings {
  const ordered = [...counts].sort((a, b) => b.net16 - a.net16)
  const total = ordered.reduce((sum, { n }) => sum + n, 0)
  const standings = new Map<number, Standing>()
  let above = 0
  for (const { net16, n } of ordered) {
    standings.set(net16, { rank: above + 1, sharedBy: n, total, below: total - above - n })
    above += n
  }
  return {
    total,
    of: net16 => standings.get(net16),
    atLeast: net16 => ordered.reduce((sum, count) => sum + (count.net16 >= net16 ? count.n : 0), 0),
  }
}

/** Share of the list that stands lower, in whole per cent rounded down; null for an empty list. */
export function percentile(standing: Standing): number | null {
  return standing.total === 0 ? null : Math.floor((100 * standing.below) / standing.total)
}

/** Ranks for nets that are already in list order, highest first: 1, 2, 2, 4. */
export function ranksInOrder(nets: readonly number[]): number[] {
  const ranks: number[] = []
  nets.forEach((net, place) => ranks.push(place > 0 && net === nets[place - 1] ? ranks[place - 1]! : place + 1))
  return ranks
}

export interface Listed {
  readonly net16: number
  /** first day of the date of taking, as far as it is known */
  readonly takenFirstOn: Day
  /** grows with the order of acceptance; the last word, so that the order is total */
  readonly id: number
}

/** List order: standing net, highest first; within a shared rank the earlier date of taking; then the earlier record. */
export function compareListed(a: Listed, b: Listed): number {
  if (a.net16 !== b.net16) return b.net16 - a.net16
  if (a.takenFirstOn !== b.takenFirstOn) return a.takenFirstOn < b.takenFirstOn ? -1 : 1
  return a.id - b.id
}

import type { Random } from './random'

type Reading = number | 'absent'

/** A grown head in whole steps of its sheet, in the form in which sheets are kept, before it is checked. */
export interface Head {
  single: Record<string, Reading>
  right: Record<string, Reading>
  left: Record<string, Reading>
  lists: Record<string, { side: 'right' | 'left', length: number, width?: number }[]>
}

/** Inches of a head that about reaches the minimum, and how much one animal differs from another (share of the mean). */
interface Growth {
  readonly inches: number
  readonly spread: number
  /** how much the sides of one animal differ, as a share */
  readonly sides: number
  /** share of animals that grow it at all; 1 where every one does */
  readonly grown?: number
  /** grows slower than the head: thickness against length */
  readonly stout?: true
}

interface Points {
  readonly mean: number
  readonly inches: number
  readonly share: number
}

interface Plan {
  readonly perInch: 8 | 16
  readonly single: Readonly<Record<string, Growth>>
  readonly paired: Readonly<Record<string, Growth>>
  readonly counts?: Readonly<Record<string, { readonly mean: number }>>
  readonly abnormalCount?: true
  readonly abnormal?: Points
  /** lines of which a later one cannot be there without the one before */
  readonly row?: readonly string[]
  /** lines that have to fall from the first to the last */
  readonly falling?: readonly string[]
}

const long = (inches: number, spread = 0.07, sides = 0.025): Growth => ({ inches, spread, sides })
const point = (inches: number, grown = 1): Growth => ({ inches, spread: 0.16, sides: 0.06, grown })
const round = (inches: number): Growth => ({ inches, spread: 0.05, sides: 0.012, stout: true })
const apart = (inches: number, spread = 0.12): Growth => ({ inches, spread, sides: 0 })

const whitetail: Plan = {
  perInch: 8,
  single: { insideSpread: apart(17), tipToTip: apart(11, 0.3), greatestSpread: apart(19.4, 0.1) },
  paired: {
    mainBeam: long(22.4), g1: point(4.6), g2: point(8.9), g3: point(8.4), g4: point(5.6), g5: point(2.6, 0.3), g6: point(1.8, 0.2), g7: point(1.5, 0.1),
    h1: round(4.4), h2: round(4.1), h3: round(4.15), h4: round(3.9),
  },
  row: ['g1', 'g2', 'g3', 'g4', 'g5', 'g6', 'g7'],
}
const mule: Plan = {
  perInch: 8,
  single: { insideSpread: apart(21.6), tipToTip: apart(17.5, 0.25), greatestSpread: apart(25, 0.12) },
  paired: {
    mainBeam: long(22.6), g1: point(2.3, 0.93), g2: point(13.2), g3: point(9), g4: point(9.8),
    h1: round(4.6), h2: round(4.3), h3: round(4), h4: round(4),
  },
}
const elk: Plan = {
  perInch: 8,
  single: { insideSpread: apart(37), tipToTip: apart(30, 0.2), greatestSpread: apart(42.5, 0.1) },
  paired: {
    mainBeam: long(46.5), g1: point(14), g2: point(14.2), g3: point(14.4), g4: point(18), g5: point(10.5), g6: point(5, 0.35), g7: point(3, 0.12),
    h1: round(8), h2: round(6.7), h3: round(6.5), h4: round(6.3),
  },
  row: ['g1', 'g2', 'g3', 'g4', 'g5', 'g6', 'g7'],
}

const PLANS: Readonly<Record<string, Plan>> = {
  'whitetail-typical': { ...whitetail, abnormal: { mean: 0.35, inches: 1.6, share: 0.5 } },
  'whitetail-nontypical': { ...whitetail, abnormal: { mean: 6, inches: 2.8, share: 0.6 } },
  'mule-deer-typical': { ...mule, abnormal: { mean: 0.45, inches: 1.7, share: 0.5 } },
  'mule-deer-nontypical': { ...mule, abnormal: { mean: 8, inches: 3, share: 0.6 } },
  'elk-typical': { ...elk, abnormal: { mean: 0.2, inches: 2.5, share: 0.5 } },
  'elk-nontypical': { ...elk, abnormal: { mean: 3.5, inches: 6, share: 0.6 } },
  moose: {
    perInch: 8,
    single: { greatestSpread: apart(44, 0.08) },
    paired: { palmWidth: long(9.6, 0.14, 0.05), palmLength: long(29.5, 0.08, 0.035), beamCircumference: round(6.9) },
    counts: { normalPoints: { mean: 9 } },
    abnormalCount: true,
  },
  pronghorn: {
    perInch: 8,
    single: { insideSpread: apart(10.5, 0.2), tipToTip: apart(6.5, 0.4) },
    paired: { hornLength: long(13.9), baseCircumference: round(6), firstQuarter: round(5.9), secondQuarter: round(3.7), thirdQuarter: round(2.5), prongLength: point(4.9) },
    falling: ['firstQuarter', 'secondQuarter', 'thirdQuarter'],
  },
  'bighorn-sheep': {
    perInch: 8,
    single: { greatestSpread: apart(21, 0.1), tipToTip: apart(17, 0.2) },
    paired: { hornLength: long(33, 0.06, 0.025), baseCircumference: round(14.4), firstQuarter: round(13.6), secondQuarter: round(11.4), thirdQuarter: round(7.4) },
    falling: ['baseCircumference', 'firstQuarter', 'secondQuarter', 'thirdQuarter'],
  },
  'mountain-goat': {
    perInch: 8,
    single: { greatestSpread: apart(7, 0.12), tipToTip: apart(6.4, 0.15) },
    paired: { hornLength: long(9, 0.06, 0.015), baseCircumference: round(5.3), firstQuarter: round(4.4), secondQuarter: round(3.05), thirdQuarter: round(1.9) },
    falling: ['baseCircumference', 'firstQuarter', 'secondQuarter', 'thirdQuarter'],
  },
  bison: {
    perInch: 8,
    single: { greatestSpread: apart(26, 0.1), tipToTip: apart(21, 0.15) },
    paired: { hornLength: long(15.4, 0.07, 0.02), baseCircumference: round(13), firstQuarter: round(11.2), secondQuarter: round(8.8), thirdQuarter: round(5.6) },
    falling: ['baseCircumference', 'firstQuarter', 'secondQuarter', 'thirdQuarter'],
  },
  'black-bear': { perInch: 16, single: { skullLength: apart(11.4, 0.02), skullWidth: apart(7, 0.03) }, paired: {} },
  'grizzly-bear': { perInch: 16, single: { skullLength: apart(13.1, 0.02), skullWidth: apart(7.9, 0.03) }, paired: {} },
  cougar: { perInch: 16, single: { skullLength: apart(8, 0.02), skullWidth: apart(5.5, 0.02) }, paired: {} },
}

/** What is particular to one animal; its size is chosen afterwards. */
interface Shape {
  readonly single: Readonly<Record<string, number>>
  readonly right: Readonly<Record<string, number>>
  readonly left: Readonly<Record<string, number>>
  readonly counts: Readonly<Record<string, { right: number, left: number }>>
  readonly abnormal: readonly { side: 'right' | 'left', inches: number }[]
  readonly abnormalCount: number
}

function drawShape(plan: Plan, random: Random): Shape {
  const vary = (growth: Growth) => growth.inches * (1 + growth.spread * random.normal())
  const single: Record<string, number> = {}
  for (const [line, growth] of Object.entries(plan.single)) single[line] = vary(growth)
  const right: Record<string, number> = {}
  const left: Record<string, number> = {}
  for (const [line, growth] of Object.entries(plan.paired)) {
    const before = plan.row ? plan.row[plan.row.indexOf(line) - 1] : undefined
    const middle = vary(growth)
    for (const side of [right, left]) {
      const hasRoom = before === undefined || side[before] !== 0
      const grows = hasRoom && (growth.grown === undefined || random.chance(growth.grown))
      side[line] = grows ? middle * (1 + growth.sides * random.normal()) : 0
    }
    // One side without a point that the other has is seldom; mostly both sides agree.
    if ((right[line] === 0) !== (left[line] === 0) && random.chance(0.7)) right[line] = left[line] = 0
  }
  const counts: Record<string, { right: number, left: number }> = {}
  for (const [line, { mean }] of Object.entries(plan.counts ?? {})) {
    const middle = mean + random.normal() * 1.6
    const count = () => Math.max(3, Math.round(middle + random.normal() * 0.7))
    counts[line] = { right: count(), left: count() }
  }
  const abnormal: { side: 'right' | 'left', inches: number }[] = []
  if (plan.abnormal) {
    const { mean, inches, share } = plan.abnormal
    const many = mean < 1 ? (random.chance(mean) ? random.whole(1, 2) : 0) : Math.max(2, Math.round(mean * (1 + 0.4 * random.normal())))
    for (let place = 0; place < many; place++) {
      abnormal.push({ side: random.chance(0.5) ? 'right' : 'left', inches: Math.max(1, inches * (1 + share * random.normal())) })
    }
  }
  return { single, right, left, counts, abnormal, abnormalCount: plan.abnormalCount && random.chance(0.18) ? random.whole(1, 2) : 0 }
}

/** Points on a list that are given must be points: an inch long at least. */
const LEAST_POINT = 1

function atSize(plan: Plan, shape: Shape, size: number): Head {
  const stoutly = Math.sqrt(size)
  const steps = (inches: number) => Math.round(inches * plan.perInch)
  const head: Head = { single: {}, right: {}, left: {}, lists: {} }
  for (const line of Object.keys(plan.single)) head.single[line] = Math.max(1, steps(shape.single[line]! * size))
  for (const side of ['right', 'left'] as const) {
    for (const [line, growth] of Object.entries(plan.paired)) {
      const inches = shape[side][line]! * (growth.stout ? stoutly : size)
      const optional = growth.grown !== undefined
      head[side][line] = inches === 0 || (optional && inches < LEAST_POINT) ? 'absent' : Math.max(1, steps(inches))
    }
    for (const [line, count] of Object.entries(shape.counts)) head[side][line] = Math.max(1, Math.round(count[side] * size))
    let most = Number.POSITIVE_INFINITY
    for (const line of plan.falling ?? []) {
      const reading = head[side][line]
      if (typeof reading === 'number') head[side][line] = most = Math.min(reading, most)
    }
    for (const [place, line] of (plan.row ?? []).entries()) {
      const before = plan.row![place - 1]
      if (before !== undefined && head[side][before] === 'absent') head[side][line] = 'absent'
    }
  }
  if (plan.abnormalCount) head.single.abnormalPointCount = shape.abnormalCount
  if (plan.abnormal) {
    head.lists.abnormalPoints = shape.abnormal.map(({ side, inches }) => {
      const length = Math.max(plan.perInch, steps(inches * size))
      return length < 3 * plan.perInch ? { side, length, width: Math.max(1, Math.min(length - 1, Math.round(length * 0.45))) } : { side, length }
    })
  }
  for (const [line, greatest] of [['insideSpread', 'greatestSpread'], ['tipToTip', 'greatestSpread']] as const) {
    const [inner, outer] = [head.single[line], head.single[greatest]]
    if (typeof inner === 'number' && typeof outer === 'number' && inner > outer) head.single[greatest] = inner + plan.perInch
  }
  if (plan.perInch === 8 && plan.paired.mainBeam) {
    for (const side of ['right', 'left'] as const) head[side].points = visiblePoints(plan, head, side)
  }
  return head
}

/** What a bench counts on one side: the beam's tip, the points of the row, and the others. */
function visiblePoints(plan: Plan, head: Head, side: 'right' | 'left'): number {
  const row = Object.keys(plan.paired).filter(line => /^g\d$/.test(line) && head[side][line] !== 'absent').length
  return 1 + row + (head.lists.abnormalPoints ?? []).filter(point => point.side === side).length
}

/**
 * Grows a head of a class whose net, by `netOf` in steps of its sheet, is `target` or a little more. The shape comes from
 * `random`; the size is found by trying.
 */
export function growHead(category: string, target: number, random: Random, netOf: (head: Head) => number): Head {
  const plan = PLANS[category]
  if (!plan) throw new RangeError(`no growth known for ${category}`)
  const shape = drawShape(plan, random)
  let size = 1
  for (let turn = 0; turn < 8; turn++) {
    const net = netOf(atSize(plan, shape, size))
    if (Math.abs(net - target) <= 1) break
    size *= Math.min(1.6, Math.max(0.6, target / Math.max(net, target / 4)))
  }
  let head = atSize(plan, shape, size)
  for (let turn = 0; netOf(head) < target; turn++) {
    if (turn > 400) throw new RangeError(`no size of this ${category} reaches ${target}`)
    size *= 1.002
    head = atSize(plan, shape, size)
  }
  return head
}

/** The same head dried, or measured by other hands: every reading off by a step at most, here and there. */
export function measuredAgain(head: Head, random: Random): Head {
  const again = (reading: Reading): Reading =>
    reading === 'absent' ? reading : Math.max(1, reading + Number(random.weighted({ 0: 7, '-1': 3, 1: 1 })))
  const side = (readings: Record<string, Reading>) =>
    Object.fromEntries(Object.entries(readings).map(([line, reading]) => [line, /oints$/.test(line) ? reading : again(reading)]))
  const single = Object.fromEntries(Object.entries(head.single)
    .map(([line, reading]) => [line, line === 'abnormalPointCount' ? reading : again(reading)]))
  return { single, right: side(head.right), left: side(head.left), lists: structuredClone(head.lists) }
}

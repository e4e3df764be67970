import { describe, expect, it } from 'vitest'
import { CATEGORIES, currentDefinition, readMeasurements, score } from '#shared/domain/measuring/index'
import type { Sheet } from './oracle'
import { TABLE, secondOpinion } from './oracle'

/**
 * Sheets of each class; exact fractions by fraction.js are the judge. 27 classes make 108,000 sheets in a run;
 * `npm run oracle` takes 100,000 of each class.
 */
const SHEETS = Number(process.env.HARTROLL_ORACLE_SHEETS ?? 4_000)

/** A small generator with a fixed beginning (xorshift32), so that a failing sheet can be made again. */
function numbers(seed: number): (below: number) => number {
  let state = seed
  return (below) => {
    state ^= state << 13
    state ^= state >>> 17
    state ^= state << 5
    return (state >>> 0) % below
  }
}

/** Every length up to 64 inches in the ways in which it can be written. */
function waysOfWriting(step: 8 | 16): readonly string[][] {
  return Array.from({ length: 64 * step }, (_, steps) => {
    const whole = Math.floor(steps / step)
    const rest = steps % step
    return [`${whole} ${rest}/${step}`, `${whole}-${rest}`, `${whole} ${rest}`, String(steps / step)]
  })
}
const WRITTEN = { 8: waysOfWriting(8), 16: waysOfWriting(16) }

function randomSheet(category: string, random: (below: number) => number): Sheet {
  const lines = TABLE[category]!
  const written = WRITTEN[lines.step]
  const length = (below: number): string => {
    const ways = written[random(Math.min(below, written.length))]!
    return ways[random(ways.length)]!
  }
  const sheet: Sheet = { single: {}, right: {}, left: {}, abnormal: [], crown: [] }
  const put = (into: Record<string, string | number>, id: string, value: string | number) => {
    const fate = random(16)
    if (fate === 0) return
    into[id] = fate === 1 ? 'absent' : value
  }
  for (const [id] of lines.credits) put(sheet.single, id, length(500))
  for (const id of lines.recorded) put(sheet.single, id, length(500))
  if (lines.deductedCount) put(sheet.single, lines.deductedCount, random(20))
  for (const side of ['right', 'left'] as const) {
    for (const id of lines.compared) put(sheet[side], id, length(id === 'mainBeam' ? 500 : 160))
    for (const id of lines.notCompared) put(sheet[side], id, length(400))
    for (const id of [...lines.comparedCounts, ...lines.notComparedCounts]) put(sheet[side], id, random(30))
  }
  const sideOf = () => (random(2) === 0 ? 'right' : 'left')
  if (lines.abnormal) {
    for (let left = random(4); left > 0; left -= 1) {
      const point = { side: sideOf(), length: length(80) }
      sheet.abnormal.push(random(2) === 0 ? point : { ...point, width: length(24) })
    }
  }
  if (lines.crown) for (let left = random(4); left > 0; left -= 1) sheet.crown.push({ side: sideOf(), length: length(80) })
  return sheet
}

describe('every sheet scores as exact fractions say (fraction.js)', () => {
  it('knows every class', () => {
    expect(Object.keys(TABLE).sort()).toEqual([...CATEGORIES].sort())
    expect(CATEGORIES).toHaveLength(27)
  })

  it.each(CATEGORIES)('%s', (category) => {
    const definition = currentDefinition(category)
    const { step, abnormal, crown } = TABLE[category]!
    const random = numbers(0x9e3779b9 ^ CATEGORIES.indexOf(category))
    for (let n = 0; n < SHEETS; n += 1) {
      const sheet = randomSheet(category, random)
      const { measurements, problems } = readMeasurements(definition, {
        ...sheet.single, right: sheet.right, left: sheet.left,
        ...(abnormal ? { abnormalPoints: sheet.abnormal } : {}), ...(crown ? { crownPoints: sheet.crown } : {}),
      })
      const ours = score(definition, measurements)
      const theirs = secondOpinion(category, sheet)
      const same = problems.length === 0
        && theirs.gross.mul(step).equals(ours.gross) && theirs.grossAll.mul(step).equals(ours.grossAll)
        && theirs.differences.mul(step).equals(ours.differences) && theirs.abnormal.mul(step).equals(ours.abnormal)
        && theirs.crown.mul(step).equals(ours.crown) && theirs.net.mul(step).equals(ours.net)
      if (!same) expect.fail(`${category}: net ${ours.net}/${step}, fractions say ${theirs.net.toFraction()}; ${JSON.stringify(sheet)}; ${JSON.stringify(problems)}`)
    }
  }, 600_000)
})

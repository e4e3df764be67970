/**
 * How fast sheets are scored on one core: the explained path and the numeric one, beside a bare loop that only adds the
 * same numbers. Run by `npm run bench:score`; figures depend on the machine, the ratios hardly do.
 */
import { performance } from 'node:perf_hooks'
import { CATEGORIES, compile, currentDefinition, hasSides, isCount, isList, checkMeasurements, score, scoreSteps, slips, toSteps } from '../../shared/domain/measuring/index.ts'

const SHEETS = 20_000
const SECONDS = 2

/** xorshift32 with a fixed beginning: every run scores the same sheets. */
function numbers(seed) {
  let state = seed
  return (below) => {
    state ^= state << 13
    state ^= state >>> 17
    state ^= state << 5
    return (state >>> 0) % below
  }
}

function randomSheet(definition, random) {
  const sheet = { single: {}, right: {}, left: {}, lists: {} }
  const reading = (line) => (random(20) === 0 ? 'absent' : isCount(line) ? random(20) : 8 + random(200))
  for (const line of definition.lines) {
    if (isList(line)) {
      sheet.lists[line.id] = Array.from({ length: random(4) }, () => ({ side: random(2) ? 'right' : 'left', length: 4 + random(60), ...(line.width && random(2) ? { width: random(12) } : {}) }))
    }
    else if (hasSides(line)) {
      sheet.right[line.id] = reading(line)
      sheet.left[line.id] = reading(line)
    }
    else sheet.single[line.id] = reading(line)
  }
  return checkMeasurements(definition, sheet)
}

/** Sheets per second of a function over all sheets, after warming up. */
function perSecond(run) {
  run()
  let rounds = 0
  const begun = performance.now()
  do {
    run()
    rounds += 1
  } while (performance.now() - begun < SECONDS * 1000)
  return (rounds * SHEETS) / ((performance.now() - begun) / 1000)
}

let kept = 0

function measure(title, categories) {
  const random = numbers(20_261_201)
  const sheets = Array.from({ length: SHEETS }, (_, index) => {
    const definition = currentDefinition(categories[index % categories.length])
    return { definition, measurements: randomSheet(definition, random) }
  })
  const programs = new Map(categories.map((category) => [category, compile(currentDefinition(category))]))
  const flat = sheets.map(({ definition, measurements }) => ({ program: programs.get(definition.category), values: toSteps(programs.get(definition.category), measurements) }))
  const totals = new Int32Array(6)

  const bare = perSecond(() => {
    for (const { values } of flat) {
      let sum = 0
      for (let i = 0; i < values.length; i += 1) sum += values[i]
      kept += sum
    }
  })
  const numeric = perSecond(() => {
    for (const { program, values } of flat) kept += scoreSteps(program, values, totals)[5]
  })
  const explained = perSecond(() => {
    for (const { definition, measurements } of sheets) kept += score(definition, measurements).net
  })
  const withSlips = perSecond(() => {
    for (const { definition, measurements } of sheets) kept += score(definition, measurements).net + slips(definition, measurements).length
  })
  const row = (name, rate) => console.log(`  ${name.padEnd(28)} ${Math.round(rate).toLocaleString('en').padStart(12)} sheets/s   ${(bare / rate).toFixed(1).padStart(6)} x the bare loop's time`)
  console.log(title)
  row('bare loop over the numbers', bare)
  row('numeric path', numeric)
  row('explained path', explained)
  row('explained path with slips', withSlips)
}

measure('All classes in turn', CATEGORIES)
measure('White-tailed deer, typical', ['whitetail-typical'])
if (!Number.isFinite(kept)) throw new Error('a score was no number')

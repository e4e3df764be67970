import fc from 'fast-check'
import type { Line, ListLine, Measurements, SheetDefinition } from '#shared/domain/measuring/index'
import { checkMeasurements, CATEGORIES, currentDefinition, hasSides, isCount, isList } from '#shared/domain/measuring/index'

/** Any class that is scored. */
export const anyCategory = fc.constantFrom(...CATEGORIES)

const anyReading = (line: Line) => fc.oneof(
  { weight: 8, arbitrary: isCount(line) ? fc.nat(60) : fc.nat(600) },
  { weight: 1, arbitrary: fc.constant('absent' as const) },
)

const anyPoint = (line: ListLine) => fc.record(
  { side: fc.constantFrom('right', 'left'), length: fc.nat(120), ...(line.width ? { width: fc.nat(40) } : {}) },
  { requiredKeys: ['side', 'length'] },
)

/** Any sheet of one class: lines measured, absent and missing. */
export function anyMeasurements(definition: SheetDefinition): fc.Arbitrary<Measurements> {
  const lists = definition.lines.filter(isList)
  const sided = definition.lines.filter(hasSides)
  const single = definition.lines.filter((line) => !isList(line) && !hasSides(line))
  const readings = (lines: readonly Line[]) => fc.record(Object.fromEntries(lines.map((line) => [line.id, anyReading(line)])), { requiredKeys: [], noNullPrototype: true })
  return fc.record({
    single: readings(single),
    right: readings(sided),
    left: readings(sided),
    lists: fc.record(Object.fromEntries(lists.map((line) => [line.id, fc.array(anyPoint(line), { maxLength: 6 })])), { requiredKeys: [], noNullPrototype: true }),
  }).map((stored) => checkMeasurements(definition, stored))
}

/** Any sheet of any class. */
export const anySheet = anyCategory.chain((category) => {
  const definition = currentDefinition(category)
  return fc.record({ definition: fc.constant(definition), measurements: anyMeasurements(definition) })
})

import { describe, expect, it } from 'vitest'
import { formatSteps, parseLength, currentDefinition, isCategory, readMeasurements, score, slips } from '#shared/domain/measuring/index'
import cases from './cases.json'

/** Worked examples; the source of each stands beside it in cases.json. The exact slips of each are stated here. */
const SLIPS: Readonly<Record<string, readonly string[]>> = {
  'pub-whitetail-typ-01': [],
  'pub-black-bear-01': [],
  'con-whitetail-typ-cap': ['spread_capped insideSpread -'],
  'con-whitetail-nontyp-cap': ['spread_capped insideSpread -'],
  // Without a brow tine both lower circumferences of the left are the 5 0/8 taken there; 4 4/8 stands against it.
  'con-mule-typ': ['sides_differ h2 -'],
  'con-sitka-blacktail-typ': [],
  'con-roosevelt': [],
  'con-moose-ak': [],
  // The circumferences between the two longest top points are 9 6/8 and 10 2/8: 4/8 apart.
  'con-caribou': ['sides_differ h4 -'],
  'con-pronghorn': [],
  // The third quarters are 10 7/8 and 11 3/8: 4/8 apart. The broomed length is not compared.
  'con-bighorn': ['sides_differ thirdQuarter -'],
  'con-goat': [],
  'con-grizzly': [],
}

describe('worked examples', () => {
  it('covers every example', () => {
    expect(cases.map((example) => example.id)).toEqual(Object.keys(SLIPS))
  })

  it.each(cases.map((example) => [example.id, example] as const))('%s', (id, example) => {
    if (!isCategory(example.category)) throw new Error(`unknown class ${example.category}`)
    const definition = currentDefinition(example.category)
    const { measurements, problems } = readMeasurements(definition, example.measurements)
    expect(problems).toEqual([])
    const result = score(definition, measurements)
    const expected: Record<string, string | undefined> = example.expected
    const shown = (steps: number) => formatSteps(steps, definition.step)
    expect(shown(result.gross)).toBe(expected.gross)
    expect(shown(result.net)).toBe(expected.net)
    if (expected.differences !== undefined) expect(shown(result.differences)).toBe(expected.differences)
    if (expected.abnormal !== undefined) expect(shown(result.abnormal)).toBe(expected.abnormal)
    if (expected.crown !== undefined) expect(shown(result.crown)).toBe(expected.crown)
    expect(slips(definition, measurements).map((slip) => `${slip.code} ${slip.line} ${slip.side ?? '-'}`)).toEqual(SLIPS[id])
  })

  it('differs between non-typical and typical by twice the abnormal total ("Typical versus non-typical", Buck Manager, 10 June 2008)', () => {
    const net = (id: string) => {
      const text = cases.find((example) => example.id === id)?.expected.net
      const parsed = parseLength(text as string, '1/8')
      return parsed.ok ? parsed.value : Number.NaN
    }
    // 2 x 3 5/8 in = 58 eighths.
    expect(net('con-whitetail-nontyp-cap') - net('con-whitetail-typ-cap')).toBe(58)
  })
})

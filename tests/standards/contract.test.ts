import { describe, expect, it } from 'vitest'
import { classesFor, currentDefinition, formatSteps, readMeasurements, score, slips } from '#shared/domain/measuring/index'
import example from './contract-scores.json'

describe('the worked example of the outside contract (POST /api/scores)', () => {
  const definition = currentDefinition('mule-deer-typical')
  const { measurements, problems } = readMeasurements(definition, example.measurements)
  const result = score(definition, measurements)
  const shown = (steps: number | null) => (steps === null ? null : formatSteps(steps, definition.step))

  it('gives the figures that the contract prints', () => {
    expect(problems).toEqual([])
    expect(result).toMatchObject({ definition: 'mule-deer-typical@1', step: '1/8', complete: true, missing: [], gross: 1383, net: 1356 })
    expect({ gross: shown(result.gross), grossAll: shown(result.grossAll), differences: shown(result.differences), abnormal: shown(result.abnormal), added: shown(result.added), net: shown(result.net) })
      .toEqual({ gross: '172 7/8', grossAll: '174 4/8', differences: '1 6/8', abnormal: '1 5/8', added: '0 0/8', net: '169 4/8' })
  })

  it('explains the second point as the contract prints it', () => {
    const line = result.lines.find(({ id }) => id === 'g2')!
    expect([shown(line.counted), shown(line.difference)]).toEqual(['28 0/8', '0 4/8'])
    expect(slips(definition, measurements)).toEqual([])
  })

  it('answers both classes with the nets and margins printed', () => {
    const minimums: Record<string, number> = { 'mule-deer-typical': 158 * 8, 'mule-deer-nontypical': 181 * 8 }
    expect(classesFor('mule-deer-typical').map((category) => {
      const { net } = score(currentDefinition(category), measurements)
      return [category, shown(net), shown(net - minimums[category]!)]
    })).toEqual([['mule-deer-typical', '169 4/8', '11 4/8'], ['mule-deer-nontypical', '172 6/8', '-8 2/8']])
  })
})

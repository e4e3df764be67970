import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { currentDefinition, readMeasurements } from '#shared/domain/measuring/index'
import { draftOf, emptyDraft, groupedLines, isEmptyDraft, placesOf, readPlace, writePlace, writtenDraft } from '../../../utils/sheetDraft'
import { anySheet } from './random'

const deer = currentDefinition('mule-deer-typical')
const paths = (sideFirst: boolean, draft = emptyDraft()) => placesOf(deer, draft, sideFirst).map(({ path }) => path)

describe('a sheet as it is typed', () => {
  it('says what a kept sheet says, whatever sheet it is', () => {
    fc.assert(fc.property(anySheet, ({ definition, measurements }) => {
      const { measurements: again, problems } = readMeasurements(definition, writtenDraft(draftOf(definition, measurements)))
      expect(problems).toEqual([])
      expect(again).toEqual(measurements)
    }), { numRuns: 300 })
  })

  it('is sent without its empty places and widths', () => {
    const draft = { single: { insideSpread: ' ', tipToTip: '8' }, right: { g1: '' }, left: { g1: 'absent' }, lists: { abnormalPoints: [{ side: 'left' as const, length: '2', width: '' }] } }
    expect(writtenDraft(draft)).toEqual({ tipToTip: '8', right: {}, left: { g1: 'absent' }, abnormalPoints: [{ side: 'left', length: '2' }] })
  })

  it('is empty until something is written or a list was looked at', () => {
    expect(isEmptyDraft(emptyDraft())).toBe(true)
    expect(isEmptyDraft({ ...emptyDraft(), right: { g1: ' ' } })).toBe(true)
    expect(isEmptyDraft({ ...emptyDraft(), left: { g1: '2' } })).toBe(false)
    expect(isEmptyDraft({ ...emptyDraft(), lists: { abnormalPoints: [] } })).toBe(false)
  })

  it('goes through both sides of each line, or one side first', () => {
    expect(paths(false).slice(0, 5)).toEqual(['insideSpread', 'right.mainBeam', 'left.mainBeam', 'right.g1', 'left.g1'])
    expect(paths(true).slice(0, 3)).toEqual(['insideSpread', 'right.mainBeam', 'right.g1'])
    expect(paths(true).indexOf('left.mainBeam')).toBe(10)
    expect(paths(false).slice(-4)).toEqual(['tipToTip', 'greatestSpread', 'right.points', 'left.points'])
    expect([...paths(true)].sort()).toEqual([...paths(false)].sort())
  })

  it('has a place for length and width of every point on its list', () => {
    const draft = { ...emptyDraft(), lists: { abnormalPoints: [{ side: 'left' as const, length: '2', width: '' }] } }
    expect(paths(false, draft)).toContain('abnormalPoints.0.width')
    const place = placesOf(deer, draft, false).find(({ path }) => path === 'abnormalPoints.0.length')!
    const written = writePlace(draft, place, '3')
    expect([readPlace(draft, place), readPlace(written, place)]).toEqual(['2', '3'])
    expect(writePlace(emptyDraft(), place, '3')).toEqual(emptyDraft())
  })

  it('shows every line once, in groups', () => {
    for (const category of ['whitetail-typical', 'moose', 'caribou', 'muskox', 'cougar', 'roosevelt-elk'] as const) {
      const definition = currentDefinition(category)
      expect(groupedLines(definition).flatMap(({ lines }) => lines.map(({ id }) => id)).sort()).toEqual(definition.lines.map(({ id }) => id).sort())
    }
  })
})

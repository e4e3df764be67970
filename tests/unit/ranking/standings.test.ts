import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { standingOf, standingsOf, type NetCount } from '../../../shared/domain/ranking'

const lists = fc.uniqueArray(fc.record({ net16: fc.integer({ min: 1, max: 60 }), n: fc.integer({ min: 1, max: 5 }) }), { selector: one => one.net16, maxLength: 20 })

describe('the standings of a list, made once', () => {
  it('says for every net of the list what asking for it alone says', () => {
    fc.assert(fc.property(lists, (counts: NetCount[]) => {
      const standings = standingsOf(counts)
      for (const { net16 } of counts) expect(standings.of(net16)).toEqual(standingOf(counts, net16))
      expect(standings.total).toBe(counts.reduce((sum, { n }) => sum + n, 0))
    }))
  })

  it('knows nothing of a net that the list does not hold', () => {
    expect(standingsOf([{ net16: 10, n: 2 }]).of(11)).toBeUndefined()
  })

  it('counts the records with at least a net, that net among them', () => {
    const standings = standingsOf([{ net16: 10, n: 2 }, { net16: 30, n: 1 }, { net16: 20, n: 4 }])
    expect([9, 10, 11, 20, 30, 31].map(net16 => standings.atLeast(net16))).toEqual([7, 7, 5, 5, 1, 0])
  })
})

import { fileTypeFromBuffer } from 'file-type'
import sharp from 'sharp'
import { describe, expect, it } from 'vitest'
import { letter, photograph } from '../../../seeds/demo/papers'
import { randomFor } from '../../../seeds/demo/random'

describe('papers of the demo', () => {
  it('photographs are real JPEGs, the same for the same stream and others for another', async () => {
    const first = await photograph('deer', 'front', randomFor('a'))
    expect((await fileTypeFromBuffer(first))?.mime).toBe('image/jpeg')
    expect(await sharp(first).metadata()).toMatchObject({ width: 640, height: 480, format: 'jpeg' })
    expect((await photograph('deer', 'front', randomFor('a'))).equals(first)).toBe(true)
    expect((await photograph('deer', 'front', randomFor('b'))).equals(first)).toBe(false)
    expect((await photograph('deer', 'left', randomFor('a'))).equals(first)).toBe(false)
  })

  it.each(['elk', 'moose', 'pronghorn', 'sheep', 'goat', 'bison', 'skull'])('a %s can be drawn from every side', async (family) => {
    for (const view of ['front', 'left', 'right', 'field'] as const) {
      expect((await photograph(family, view, randomFor(family))).length).toBeGreaterThan(2_000)
    }
  })

  it('letters are PDFs whose cross-reference table points at their objects (ISO 32000-1, 7.5.4)', async () => {
    const pdf = letter('No. 1 (copy)', ['Zoë Łena', 'back\\slash'])
    expect((await fileTypeFromBuffer(pdf))?.mime).toBe('application/pdf')
    const text = pdf.toString('latin1')
    const table = Number(/startxref\n(\d+)\n%%EOF/.exec(text)![1])
    expect(text.slice(table, table + 4)).toBe('xref')
    const offsets = [...text.slice(table).matchAll(/^(\d{10}) 00000 n /gm)].map(match => Number(match[1]))
    offsets.forEach((offset, place) => expect(text.slice(offset)).toMatch(new RegExp(`^${place + 1} 0 obj\n`)))
    expect(text).toContain('Zo\xEB ?ena')
    expect(text).toContain('No. 1 \\(copy\\)')
  })
})

describe('random streams', () => {
  it('are the same for a label everywhere, and children do not move their parent', () => {
    const stream = randomFor('ochre')
    expect([stream.next(), stream.whole(1, 6), stream.chance(0.5)]).toEqual([randomFor('ochre').next(), expect.any(Number), expect.any(Boolean)])
    const [one, two] = [randomFor('x'), randomFor('x')]
    one.fork('child').next()
    expect(one.next()).toBe(two.next())
  })

  it('are uniform, normal and exponential enough for a demo', () => {
    const random = randomFor('spread')
    const mean = (draw: () => number) => Array.from({ length: 20_000 }, draw).reduce((sum, value) => sum + value, 0) / 20_000
    expect(mean(random.next)).toBeCloseTo(0.5, 1)
    expect(mean(random.normal)).toBeCloseTo(0, 1)
    expect(mean(random.exponential)).toBeCloseTo(1, 1)
    expect(new Set(Array.from({ length: 200 }, () => random.whole(1, 3)))).toEqual(new Set([1, 2, 3]))
    const weighted = Array.from({ length: 5_000 }, () => random.weighted({ a: 9, b: 1 }))
    expect(weighted.filter(key => key === 'b').length / 5_000).toBeCloseTo(0.1, 1)
  })
})

import { beforeAll, describe, expect, test } from 'vitest'
import example from '../standards/contract-scores.json'
import { CATEGORIES } from '../../shared/domain/measuring/index'
import { categoriesAnswer, scoreAnswer } from '../../shared/schemas/scores'
import { useApp } from '../support/app'

const app = useApp()

/** The demo society's minimums, invented, and a short list with a tie. */
beforeAll(async () => {
  const { db } = app
  const id = async (code: string) => (await db('classes').where({ code }).first('id'))!.id as number
  const [typical, nontypical, bear] = await Promise.all(['mule-deer-typical', 'mule-deer-nontypical', 'black-bear'].map(id)) as [number, number, number]
  await db('classes').whereIn('id', [typical, nontypical, bear]).update({ offered: 1 })
  const [past] = await db('minimums_terms').insert({ label: 'before', from_on: '2020-01-01', to_on: '2025-12-31' }) as [number]
  const [term] = await db('minimums_terms').insert({ label: 'now', from_on: '2026-01-01', to_on: null }) as [number]
  await db('minimums').insert([
    { term_id: past, class_id: typical, min16: 150 * 16 },
    { term_id: term, class_id: typical, min16: 158 * 16 }, { term_id: term, class_id: nontypical, min16: 181 * 16 }, { term_id: term, class_id: bear, min16: 18 * 16 + 3 },
  ])
  const net = 169 * 16 + 8
  await db('list_counts').insert([
    { class_id: typical, district_id: 0, method: '', net16: net + 2, n: 3 },
    { class_id: typical, district_id: 0, method: '', net16: net, n: 2 },
    { class_id: typical, district_id: 0, method: '', net16: net - 2, n: 40 },
    { class_id: typical, district_id: 0, method: 'rifle', net16: net + 2, n: 3 },
  ])
})

const score = (body: unknown) => app.visitor.post('/api/scores').send(body as object)

describe('POST /api/scores', () => {
  test('answers the contract\'s example with the figures printed there', async () => {
    const answer = await score(example)
    expect(answer.status).toBe(200)
    expect(answer.headers['cache-control']).toBe('no-store')
    expect(scoreAnswer.parse(answer.body)).toEqual(answer.body)
    expect(answer.body).toMatchObject({
      category: 'mule-deer-typical', definition: 'mule-deer-typical@1', step: '1/8 in', complete: true, missing: [],
      gross: '172 7/8', grossUnits: 1383, grossAll: '174 4/8', differences: '1 6/8', abnormal: '1 5/8', added: '0 0/8', net: '169 4/8', netUnits: 1356, slips: [],
    })
    expect(answer.body.lines.find(({ id }: { id: string }) => id === 'g2')).toEqual({
      id: 'g2', label: 'Second point, back fork (G2)', right: '14 2/8', left: '13 6/8', value: null, points: null, counted: '28 0/8', difference: '0 4/8', share: '27 4/8', note: null,
    })
    // Three stand above; equal nets share the rank.
    expect(answer.body.classes).toEqual([
      { category: 'mule-deer-typical', net: '169 4/8', minimum: '158 0/8', margin: '11 4/8', rank: 4 },
      { category: 'mule-deer-nontypical', net: '172 6/8', minimum: '181 0/8', margin: '-8 2/8', rank: null },
    ])
  })

  test('rounds every measurement down first when asked', async () => {
    const answer = await score({ ...example, roundDown: 'inch' })
    expect(answer.body.lines.find(({ id }: { id: string }) => id === 'mainBeam')).toMatchObject({ right: '23 0/8', left: '22 0/8', difference: '1 0/8' })
  })

  test('says nothing of minimum and rank for a class that is not offered', async () => {
    const answer = await score({ category: 'muskox', measurements: { right: { hornLength: '25' } } })
    expect(answer.status).toBe(200)
    expect(answer.body.complete).toBe(false)
    expect(answer.body.classes).toEqual([{ category: 'muskox', net: '0 0/8', minimum: null, margin: null, rank: null }])
  })

  test('scores skulls in sixteenths', async () => {
    const answer = await score({ category: 'black-bear', measurements: { skullLength: '11 9/16', skullWidth: '7 3/16' } })
    expect(answer.body).toMatchObject({ step: '1/16 in', net: '18 12/16', classes: [{ minimum: '18 3/16', margin: '0 9/16', rank: 1 }] })
  })

  test('tells slips in words and takes numbers of inches', async () => {
    const answer = await score({ category: 'whitetail-typical', measurements: { insideSpread: 25.125, right: { mainBeam: 24.375 }, left: { mainBeam: '23-6' } } })
    expect(answer.body.slips).toEqual([{ code: 'spread_capped', line: 'insideSpread', side: null, severity: 'notice', message: 'The inside spread of 25 1/8 is longer than the longer beam. 24 3/8 counts.' }])
  })

  test.each([
    ['21 9/8', 'fraction_over_one', /22 1\/8/], ['21 3/7', 'off_step', /21 3\/8 or 21 4\/8/], ['22.3', 'off_step', /22 2\/8 or 22 3\/8/], ['-2', 'negative', /below 0/], [-2, 'negative', /below 0/],
    ['1e9', 'unreadable', /21 3\/8/], [1e9, 'too_long', /240 inches/], ['٢١', 'other_digits', /21/], ['<b>', 'unreadable', /length/], [true, 'not_a_measurement', /not a measurement/],
  ])('refuses %j beside its field, in words', async (written, code, words) => {
    const answer = await score({ category: 'mule-deer-typical', measurements: { right: { g2: written } } })
    expect(answer.status).toBe(422)
    expect(answer.headers['content-type']).toMatch(/^application\/problem\+json/)
    expect(answer.body.errors).toEqual([{ path: 'measurements.right.g2', code, message: expect.stringMatching(words) }])
  })

  test('refuses what is no sheet, more points than a list holds, and fields that are not known', async () => {
    const points = Array.from({ length: 201 }, () => ({ side: 'right', length: '2' }))
    expect((await score({ category: 'mule-deer-typical', measurements: { abnormalPoints: points } })).body.errors)
      .toEqual([{ path: 'measurements.abnormalPoints', code: 'too_many_points', message: 'A list holds at most 200 points; 201 were given.' }])
    expect((await score({ category: 'mule-deer-typical', measurements: { right: 'all of it', nose: '3' } })).body.errors.map(({ path }: { path: string }) => path))
      .toEqual(['measurements.right', 'measurements.nose'])
    for (const body of [{}, { category: 'mule-deer-typical' }, { category: 'mule-deer-typical', measurements: [] }, { category: 'mule-deer-typical', measurements: {}, roundDown: 'up' }, { ...example, extra: 1 }]) {
      const answer = await score(body)
      expect([answer.status, answer.body.code], JSON.stringify(body)).toEqual([422, 'invalid_input'])
    }
  })

  test('an empty sheet is a score of nothing that names what is missing', async () => {
    const answer = await score({ category: 'cougar', measurements: {} })
    expect(answer.body).toMatchObject({ complete: false, missing: ['skullLength', 'skullWidth'], net: '0 0/16' })
  })

  test('an unknown class is 404, a body over 64 KiB is 413, no JSON is 400', async () => {
    expect((await score({ category: 'house-cat', measurements: {} })).status).toBe(404)
    expect((await score({ category: 'constructor', measurements: {} })).status).toBe(404)
    const points = Array.from({ length: 10_000 }, () => ({ side: 'right', length: '2' }))
    expect((await score({ category: 'mule-deer-typical', measurements: { abnormalPoints: points } })).status).toBe(413)
    const broken = await app.visitor.post('/api/scores').set('content-type', 'application/json').send('{"category":')
    expect([broken.status, broken.headers['content-type']]).toEqual([400, expect.stringMatching(/^application\/problem\+json/)])
  })

  test('stores nothing', async () => {
    const before = await app.db('sheets').count({ n: '*' }).first()
    await score(example)
    expect(await app.db('sheets').count({ n: '*' }).first()).toEqual(before)
  })
})

describe('GET /api/categories', () => {
  test('lists every class with species, scientific name, lines and the minimum in force', async () => {
    const answer = await app.visitor.get('/api/categories')
    expect(answer.status).toBe(200)
    const { items } = categoriesAnswer.parse(answer.body)
    expect(items.map(({ category }) => category)).toEqual([...CATEGORIES])
    expect(items.find(({ category }) => category === 'mule-deer-typical')).toMatchObject({
      name: 'Mule deer, typical', species: 'mule-deer', speciesName: 'Mule deer', scientificName: 'Odocoileus hemionus', offered: true, minimum: '158 0/8', definition: 'mule-deer-typical@1',
    })
    expect(items.find(({ category }) => category === 'muskox')).toMatchObject({ offered: false, minimum: null })
    expect(items[0]?.lines.find(({ id }) => id === 'insideSpread')).toEqual({ id: 'insideSpread', label: 'Inside spread', kind: 'credit', sides: false, difference: false, capBy: 'mainBeam' })
  })

  test('is answered with 304 to who holds the same', async () => {
    const first = await app.visitor.get('/api/categories')
    const again = await app.visitor.get('/api/categories').set('if-none-match', first.headers.etag as string)
    expect([again.status, again.text]).toEqual([304, ''])
    expect(first.headers['cache-control']).toMatch(/max-age=5/)
  })
})

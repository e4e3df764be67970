import type { Page } from 'playwright-core'
import { beforeAll, describe, expect, test } from 'vitest'
import example from '../standards/contract-scores.json'
import { useApp } from '../support/app'
import { fits, shot, useBrowser, visit, WIDTHS } from '../support/browser'

const app = useApp()
const browser = useBrowser(app)

beforeAll(async () => {
  const { db } = app
  const codes = ['whitetail-typical', 'whitetail-nontypical', 'mule-deer-typical', 'mule-deer-nontypical', 'elk-typical', 'elk-nontypical', 'moose', 'bighorn-sheep', 'black-bear']
  await db('classes').whereIn('code', codes).update({ offered: 1 })
  const classes = await db('classes').whereIn('code', codes).select('id', 'code')
  const [term] = await db('minimums_terms').insert({ label: 'now', from_on: '2026-01-01', to_on: null }) as [number]
  const least: Record<string, number> = { 'mule-deer-typical': 158 * 16, 'mule-deer-nontypical': 181 * 16, 'black-bear': 18 * 16 + 3 }
  await db('minimums').insert(classes.map(({ id, code }) => ({ term_id: term, class_id: id, min16: least[code] ?? 120 * 16 })))
  const typical = classes.find(({ code }) => code === 'mule-deer-typical')!.id
  await db('list_counts').insert({ class_id: typical, district_id: 0, method: '', net16: 180 * 16, n: 211 })
})

const field = (page: Page, name: string) => page.getByLabel(name, { exact: true })

/** Types the contract's example line by line, as a person at a bench would, Enter after each. */
async function typeExample(page: Page) {
  const { insideSpread, right, left } = example.measurements
  await field(page, 'Inside spread').fill(insideSpread)
  for (const [line, label] of [
    ['mainBeam', 'Main beam'], ['g1', 'Brow tine (G1)'], ['g2', 'Second point, back fork (G2)'], ['g3', 'Third point, branch of the second (G3)'], ['g4', 'Fourth point, front fork (G4)'],
    ['h1', 'First circumference (H1)'], ['h2', 'Second circumference (H2)'], ['h3', 'Third circumference (H3)'], ['h4', 'Fourth circumference (H4)'],
  ] as const) {
    await field(page, `${label}, the animal's right`).fill(right[line])
    await field(page, `${label}, the animal's left`).fill(left[line].replace(' ', '-').replace('/8', ''))
  }
  await page.getByRole('button', { name: 'Add one on the left' }).click()
  await field(page, 'Abnormal points, number 1, length').fill('1 5/8')
  await field(page, 'Abnormal points, number 1, width one inch below the tip').fill('0 5/8')
}

describe('the rough score', () => {
  test('fits every width in light and dark, and axe finds nothing', async () => {
    const page = await browser.open()
    await visit(page, '/measure')
    await fits(page, 'measure', [...WIDTHS, 360])
    await page.getByRole('link', { name: /^Mule deer, typical/ }).click()
    await page.getByRole('heading', { level: 1, name: 'Mule deer, typical' }).waitFor()
    await typeExample(page)
    await page.getByText('Rank it would take').waitFor()
    await fits(page, 'sheet', [...WIDTHS, 360])
  })

  test('draws the animal from its numbers, lights the line that is measured, and goes to what is touched', async () => {
    const page = await browser.open()
    await visit(page, '/measure/mule-deer-typical')
    await page.getByText('The animal draws itself as you write its numbers.').waitFor()
    await typeExample(page)
    const drawing = page.getByRole('img', { name: /^Antlers of Mule deer, typical, seen from the front: 5 × 6 points/ })
    await drawing.waitFor()
    await field(page, 'Second point, back fork (G2), the animal\'s left').focus()
    await page.getByText('The tape begins at the full dot and ends at the open one.').waitFor()
    expect(await drawing.locator('circle').count()).toBe(2)
    await drawing.locator('g.cursor-pointer').last().dispatchEvent('click')
    expect(await page.evaluate(() => document.activeElement?.getAttribute('aria-label') ?? document.activeElement?.id)).toMatch(/mainBeam|Main beam/)
  })

  test('answers gross, frame, net, margins and ranks of both classes', async () => {
    const page = await browser.open()
    await visit(page, '/measure/mule-deer-typical')
    await typeExample(page)
    const result = page.getByRole('region', { name: 'What it scores, roughly' })
    const rows = (name: string) => result.locator('tbody', { hasText: name })
    await rows('Mule deer, typical').getByText('212').first().waitFor()
    const said = async (name: string) => (await rows(name).getByRole('row', { name: 'as read' }).innerText()).replace(/\s+/g, ' ')
    expect(await said('Mule deer, typical')).toMatch(/1694\/8.*1580\/8.*\+114\/8.*212/)
    expect(await said('Mule deer, non-typical')).toMatch(/1726\/8.*1810\/8.*−82\/8.*–/)
    await expect(result.getByText('5 × 6 points').first().innerText()).resolves.toMatch(/22 3\/8 inside · longer beam 23 1\/8/)
  })

  test('keeps every figure through a reload and hands it to an entry', async () => {
    const page = await browser.open()
    await visit(page, '/measure/mule-deer-typical')
    await typeExample(page)
    await page.waitForURL(/sheet=/)
    await page.reload()
    await page.getByText('Rank it would take').waitFor()
    expect(await field(page, 'Main beam, the animal\'s right').inputValue()).toBe('23 1/8')
    const link = await page.getByRole('link', { name: 'Begin an entry with it' }).getAttribute('href')
    expect(link).toBe(`/desk/entries/new?rough=${new URL(page.url()).searchParams.get('sheet')}`)
    await visit(page, '/measure')
    await page.getByRole('heading', { name: 'Your sheets' }).waitFor()
    await page.getByRole('button', { name: 'Remove the sheet Mule deer, typical' }).click()
    await page.getByRole('button', { name: 'Remove it for good' }).click()
    expect(await page.getByRole('heading', { name: 'Your sheets' }).count()).toBe(0)
  })

  test('opens the same sheet in the other class of the species', async () => {
    const page = await browser.open()
    await visit(page, '/measure/mule-deer-typical')
    await typeExample(page)
    await page.getByRole('link', { name: 'Mule deer, non-typical' }).click()
    await page.getByRole('heading', { level: 1, name: 'Mule deer, non-typical' }).waitFor()
    await page.getByRole('region', { name: 'What it scores, roughly' }).getByRole('link', { name: 'Mule deer, typical' }).waitFor()
    expect(await field(page, 'Main beam, the animal\'s right').inputValue()).toBe('23 1/8')
  })

  test('says beside the field what cannot be read, once it was left, and loses nothing', async () => {
    const page = await browser.open()
    await visit(page, '/measure/mule-deer-typical')
    await field(page, 'Main beam, the animal\'s right').fill('22.3')
    expect(await page.getByText('22 2/8 or 22 3/8').count()).toBe(0)
    await field(page, 'Main beam, the animal\'s right').press('Enter')
    await page.getByText('22 2/8 or 22 3/8').waitFor()
    expect(await field(page, 'Main beam, the animal\'s right').inputValue()).toBe('22.3')
    expect(await field(page, 'Main beam, the animal\'s right').getAttribute('aria-invalid')).toBe('true')
  })

  test('tells a slip at once, and goes on', async () => {
    const page = await browser.open()
    await visit(page, '/measure/mule-deer-typical')
    await field(page, 'First circumference (H1), the animal\'s right').fill('4')
    await field(page, 'Second circumference (H2), the animal\'s right').fill('4 3/8')
    await page.locator('li', { hasText: 'It should shrink' }).waitFor()
    await field(page, 'Second circumference (H2), the animal\'s right').press('Enter')
    expect(await page.evaluate(() => document.activeElement?.getAttribute('aria-label'))).toBe('Second circumference (H2), the animal\'s left')
  })

  test('goes from line to line by Enter, both sides of a line or one side first', async () => {
    const page = await browser.open()
    await visit(page, '/measure/black-bear')
    await field(page, 'Skull length').fill('11 9/16')
    await field(page, 'Skull length').press('Enter')
    expect(await page.evaluate(() => document.activeElement?.getAttribute('aria-label'))).toBe('Skull width')
    await visit(page, '/measure/moose')
    await field(page, 'Normal points, the animal\'s right').fill('13')
    await field(page, 'Normal points, the animal\'s right').press('Enter')
    expect(await page.evaluate(() => document.activeElement?.getAttribute('aria-label'))).toBe('Normal points, the animal\'s left')
    await page.getByLabel('Finish one side first').check()
    await field(page, 'Width of palm, the animal\'s right').fill('x')
    await field(page, 'Width of palm, the animal\'s right').press('Enter')
    expect(await field(page, 'Width of palm, the animal\'s right').inputValue()).toBe('not there')
    expect(await page.evaluate(() => document.activeElement?.getAttribute('aria-label'))).toBe('Length of palm, the animal\'s right')
  })

  test('is written by thumb in three taps a line', async () => {
    const page = await browser.open({ width: 360 })
    await visit(page, '/measure/mule-deer-typical')
    await page.getByLabel('Enter by taps').check()
    await field(page, 'Inside spread').focus()
    const taps = page.getByRole('group', { name: 'Taps' }).last()
    await taps.getByRole('button', { name: '2', exact: true }).click()
    await taps.getByRole('button', { name: '2', exact: true }).click()
    await taps.getByRole('button', { name: '3/8' }).click()
    expect(await field(page, 'Inside spread').inputValue()).toBe('22 3/8')
    expect(await page.evaluate(() => document.activeElement?.getAttribute('aria-label'))).toBe('Main beam, the animal\'s right')
    await shot(page, 'sheet-taps-360')
    await taps.getByRole('button', { name: 'Not there' }).click()
    expect(await field(page, 'Main beam, the animal\'s right').inputValue()).toBe('not there')
    await field(page, 'Brow tine (G1), the animal\'s right').focus()
    await taps.getByRole('button', { name: 'No more points on this side' }).click()
    expect(await field(page, 'Fourth point, front fork (G4), the animal\'s right').inputValue()).toBe('not there')
  })

  test('leaves the score standing when the lists cannot be reached', async () => {
    const page = await browser.openForgiving()
    await page.route('**/api/scores', route => route.abort())
    await visit(page, '/measure/black-bear')
    await field(page, 'Skull length').fill('11 9/16')
    await field(page, 'Skull width').fill('7 3/16')
    await page.getByText('The lists cannot be reached').waitFor()
    expect(await page.getByText('18 and 12 sixteenths inches').count()).toBeGreaterThan(0)
  })

  test('labels what is only an estimate or a split skull', async () => {
    const page = await browser.open()
    await visit(page, '/measure/elk-typical')
    await field(page, 'Inside spread').fill('40')
    await field(page, 'Main beam, the animal\'s right').fill('50')
    await page.getByLabel('The skull is split: the spread does not count').check()
    await page.getByText('Split skull: spread not counted').waitFor()
    await page.getByLabel('Broken, or a single shed?').selectOption('right')
    await page.getByText('Estimate: if the other side matched the right').waitFor()
    expect(await page.getByText('100 and 0 eighths inches').count()).toBeGreaterThan(0)
  })

  test('prints on one page, without the form', async () => {
    const page = await browser.open()
    await visit(page, '/measure/mule-deer-typical')
    await typeExample(page)
    await page.getByText('Rank it would take').waitFor()
    await page.emulateMedia({ media: 'print' })
    await shot(page, 'sheet-print')
    const pdf = await page.pdf({ format: 'Letter', margin: { top: '12mm', bottom: '12mm', left: '12mm', right: '12mm' } })
    expect(pdf.toString('latin1').match(/\/Type\s*\/Page\b/g)?.length).toBe(1)
  })

  test('an unknown animal is not there', async () => {
    const page = await browser.openForgiving()
    const answer = await page.goto('/measure/house-cat')
    expect(answer?.status()).toBe(404)
  })
})

import { beforeAll, describe, expect, test } from 'vitest'
import { seedDemo } from '../../seeds/demo'
import { useApp } from '../support/app'
import { fits, hydrated, tooWide, useBrowser, visit } from '../support/browser'

const app = useApp()
const browser = useBrowser(app)
let withSheet: number
let bare: number
let challenged: number
beforeAll(async () => {
  await seedDemo(app.db, { now: app.clock.now(), scale: 0.05 })
  const first = async (where: object, sheet: boolean) => (await app.db('records').where(where)[sheet ? 'whereNotNull' : 'whereNull']('sheet_id').first('record_no'))!.record_no
  withSheet = await first({ status: 'accepted', source: 'certified' }, true)
  bare = await first({ status: 'accepted', source: 'taken_over' }, false)
  challenged = await first({ status: 'challenged' }, true)
})

describe.each([
  ['all lists', (): string => '/records'],
  ['a class', (): string => '/records?category=mule-deer-typical'],
  ['a narrow choice', (): string => '/records?category=mule-deer-typical&method=rifle&from=1950&to=2025&q=a&sort=-takenOn'],
  ['nothing found', (): string => '/records?category=moose&q=zzzz'],
  ['a record', (): string => `/records/${withSheet}`],
  ['a record without a sheet', (): string => `/records/${bare}`],
  ['a challenged record', (): string => `/records/${challenged}`],
  ['measurers', (): string => '/measurers'],
] as const)('%s', (name, path) => {
  test('fits every width in light and dark, and axe finds nothing', async () => {
    const page = await browser.open()
    await visit(page, path())
    await fits(page, `public-${name.replaceAll(' ', '-')}`)
  })
})

test('the narrowest phone holds every page before the typefaces have come, or when they never do', async () => {
  const page = await browser.openForgiving({ width: 320 })
  await page.route(/\.woff2?$/, route => route.abort())
  for (const path of ['/', '/records', '/records?category=mule-deer-typical', `/records/${withSheet}`, `/records/${bare}`, `/records/${challenged}`, '/measurers', '/measure', '/measure/moose', '/sign-in']) {
    await visit(page, path)
    expect(await tooWide(page), path).toEqual([])
  }
})

describe('without JavaScript', () => {
  test('the lists are read, narrowed, sorted and paged', async () => {
    const page = await browser.open({ javaScript: false })
    await page.goto('/records')
    expect(await page.locator('tbody tr').count()).toBe(50)
    await page.locator('select[name=category]').selectOption('whitetail-typical')
    await page.getByRole('button', { name: 'Show' }).click()
    expect(new URL(page.url()).searchParams.get('category')).toBe('whitetail-typical')
    const nets = async () => (await page.locator('tbody tr .at-net').allInnerTexts())
    const before = await nets()
    await page.getByRole('columnheader', { name: /Gross/ }).getByRole('link').click()
    expect(new URL(page.url()).searchParams.get('sort')).toBe('-gross')
    expect(await nets()).not.toEqual(before)
    await page.locator('tbody a').first().click()
    expect(await page.locator('h1').count()).toBe(1)
    expect(new URL(page.url()).pathname).toMatch(/^\/records\/\d+$/)
  })

  test('a page further on is a link, and so is the way back', async () => {
    const page = await browser.open({ javaScript: false })
    await page.goto('/records')
    const first = await page.locator('tbody tr').first().innerText()
    await page.locator('a[rel=next]').click()
    expect(await page.locator('tbody tr').first().innerText()).not.toBe(first)
    await page.locator('a[rel=prev]').click()
    expect(await page.locator('tbody tr').first().innerText()).toBe(first)
  })
})

describe('with JavaScript', () => {
  test('a choice shows in place, says so, stands in the URL, and the way back is exact', async () => {
    const page = await browser.open()
    await visit(page, '/records?species=elk')
    const before = await page.locator('tbody').innerText()
    const most = await app.db('records as r').join('districts as d', 'd.id', 'r.district_id').join('species as s', 's.id', 'r.species_id')
      .where('s.code', 'elk').whereIn('r.status', ['accepted', 'challenged']).groupBy('d.code').orderByRaw('COUNT(*) DESC').first('d.code')
    await page.locator('select[name=district]').selectOption(most!.code)
    await page.waitForURL(/district=/)
    await page.waitForFunction(text => document.querySelector('tbody')?.innerText !== text, before)
    const narrowed = await page.locator('main [role=status]').innerText()
    expect(narrowed).toMatch(/^Elk, all classes, (?!all districts)/)
    await page.getByRole('columnheader', { name: /Name/ }).getByRole('link').click()
    await page.waitForURL(/sort=hunter/)
    // The address changes first, the lines follow when they have come.
    await expect.poll(() => page.getByRole('columnheader', { name: /Name/ }).getAttribute('aria-sort')).toBe('ascending')
    await page.goBack()
    await page.goBack()
    await page.waitForURL(url => !url.search.includes('district'))
    await page.waitForFunction(text => document.querySelector('tbody')?.innerText === text, before)
    expect(await page.locator('select[name=district]').inputValue()).toBe('')
  })

  test('from a record the way back is the same page of the list', async () => {
    const page = await browser.open()
    await visit(page, '/records')
    await page.locator('a[rel=next]').click()
    await page.waitForURL(/cursor=/)
    await page.locator('a[rel=prev]').waitFor()
    const lines = await page.locator('tbody').innerText()
    await page.locator('tbody a').nth(7).click()
    await page.waitForURL(/\/records\/\d+$/)
    await page.locator('h1').waitFor()
    await page.goBack()
    await page.waitForFunction(text => document.querySelector('tbody')?.innerText === text, lines)
  })

  test('what somebody typed is text, whatever it looks like', async () => {
    const page = await browser.open()
    await visit(page, `/records?q=${encodeURIComponent('<img src=x onerror=alert(1)>')}`)
    expect(await page.locator('main img').count()).toBe(0)
    expect(await page.locator('input[name=q]').inputValue()).toBe('<img src=x onerror=alert(1)>')
  })

  test('a page mark that was tampered with says so and leads to the beginning', async () => {
    const page = await browser.openForgiving()
    await page.goto('/records?category=moose&cursor=tampered')
    await hydrated(page)
    await page.getByRole('link', { name: 'From the beginning of this list' }).click()
    await page.locator('tbody tr').first().waitFor()
    expect(new URL(page.url()).search).toBe('?category=moose')
  })
})

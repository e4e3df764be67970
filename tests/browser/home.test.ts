import { describe, expect, test } from 'vitest'
import { useApp } from '../support/app'
import { axeFindings, overflow, shot, useBrowser, visit, WIDTHS } from '../support/browser'

const app = useApp()
const browser = useBrowser(app)

describe('the first page', () => {
  for (const width of WIDTHS) {
    test(`fits ${width} pixels, in light and dark, and axe finds nothing`, async () => {
      for (const colorScheme of ['light', 'dark'] as const) {
        const page = await browser.open({ width, colorScheme })
        await visit(page, '/')
        await expect(page.title()).resolves.toMatch(/Hartroll/)
        expect(await overflow(page)).toBe(0)
        expect(await axeFindings(page)).toEqual([])
        await shot(page, `home-${width}-${colorScheme}`)
      }
    })
  }

  test('reads without JavaScript', async () => {
    const page = await browser.open({ javaScript: false })
    await page.goto('/')
    expect(await page.locator('h1').count()).toBe(1)
  })
})

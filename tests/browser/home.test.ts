import { describe, expect, test } from 'vitest'
import { useApp } from '../support/app'
import { fits, useBrowser, visit } from '../support/browser'

const app = useApp()
const browser = useBrowser(app)

describe('the first page', () => {
  test('fits every width in light and dark, and axe finds nothing', async () => {
    const page = await browser.open()
    await visit(page, '/')
    await expect(page.title()).resolves.toMatch(/Hartroll/)
    await fits(page, 'home')
  })

  test('reads without JavaScript', async () => {
    const page = await browser.open({ javaScript: false })
    await page.goto('/')
    expect(await page.locator('h1').count()).toBe(1)
  })
})

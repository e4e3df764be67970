import { existsSync, mkdirSync, readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import type AxeNamespace from 'axe-core'
import { chromium, type Browser, type BrowserContext, type Page } from 'playwright-core'
import { afterAll, afterEach, beforeAll, expect } from 'vitest'
import type { App, Client } from './app'

const CHROMIUM = process.env.CHROMIUM ?? '/usr/bin/chromium'
const SHOTS = fileURLToPath(new URL('../../.cache/screenshots', import.meta.url))

/** Nothing may ask a foreign host, and nothing of a first run may stand in the way. */
const FLAGS = [
  '--no-sandbox', '--disable-quic', '--no-first-run', '--disable-background-networking',
  '--disable-component-update', '--disable-sync', '--disable-dev-shm-usage', '--disable-gpu',
]

/** Phone, tablet, desk: every page is looked at in all three. */
export const WIDTHS = [320, 768, 1440] as const

/** The window of a device as wide as that. */
const sizeOf = (width: number) => ({ width, height: width < 500 ? 700 : 900 })

/** Rules of WCAG 2.2 up to AA, as axe tags them, and its own best practices. */
const AXE_TAGS = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice']

export interface OpenOptions {
  readonly width?: number
  readonly as?: Client
  readonly javaScript?: boolean
  readonly colorScheme?: 'light' | 'dark'
}

export interface Browsing {
  /** A page of a context of its own. The first navigation is the caller's. */
  open(options?: OpenOptions): Promise<Page>
  /** A page that a console error or a failed request is expected on; `open` lets none pass. */
  openForgiving(options?: OpenOptions): Promise<Page>
}

/**
 * Chromium for the tests of one file. After each test every page that was opened by `open` must have had no console
 * error, no hydration warning, no uncaught exception, and asked no foreign host.
 */
export function useBrowser(app: App): Browsing {
  let browser: Browser | undefined
  let contexts: BrowserContext[] = []
  let complaints: string[] = []

  beforeAll(async () => {
    if (!existsSync(CHROMIUM)) throw new Error(`${CHROMIUM} is missing; npm test installs it, or: apt-get install chromium`)
    browser = await chromium.launch({ executablePath: CHROMIUM, args: FLAGS })
  })
  afterEach(async () => {
    const [closing, heard] = [contexts, complaints]
    contexts = []
    complaints = []
    await Promise.all(closing.map(context => context.close()))
    expect(heard, 'what the browser complained about').toEqual([])
  })
  afterAll(async () => {
    await browser?.close()
  })

  async function open({ width = 1440, as, javaScript = true, colorScheme = 'light' }: OpenOptions, complain: (line: string) => void): Promise<Page> {
    if (!browser) throw new Error('The browser is there from beforeAll on')
    const context = await browser.newContext({
      baseURL: app.url,
      viewport: sizeOf(width),
      javaScriptEnabled: javaScript,
      colorScheme,
      reducedMotion: 'reduce',
      locale: 'en-US',
      timezoneId: 'America/Denver',
    })
    contexts.push(context)
    if (as?.cookie) {
      const [name = '', value = ''] = as.cookie.split(/=(.*)/s)
      await context.addCookies([{ name, value, url: app.url, httpOnly: true, sameSite: 'Lax' }])
    }
    const page = await context.newPage()
    page.on('pageerror', error => complain(`uncaught: ${error.message}`))
    page.on('console', (message) => {
      if (message.type() === 'error' || /hydration|\[Vue warn\]/i.test(message.text())) complain(`${message.type()}: ${message.text()} (${page.url()})`)
    })
    page.on('request', (request) => {
      if (!request.url().startsWith(app.url) && !/^(data|blob|about):/.test(request.url())) complain(`asked a foreign host: ${request.url()}`)
    })
    return page
  }

  return {
    open: (options = {}) => open(options, line => complaints.push(line)),
    openForgiving: (options = {}) => open(options, () => {}),
  }
}

/** Waits until Vue has taken the page over, so that a click is heard. */
export async function hydrated(page: Page): Promise<void> {
  await page.waitForFunction(() => {
    const root = document.querySelector('#__nuxt') as (Element & { __vue_app__?: { $nuxt?: { isHydrating?: boolean } } }) | null
    return root?.__vue_app__ !== undefined && root.__vue_app__.$nuxt?.isHydrating !== true
  })
}

/** Opens an address and waits until the page answers to clicks. */
export async function visit(page: Page, address: string): Promise<void> {
  await page.goto(address)
  await hydrated(page)
}

const AXE = createRequire(import.meta.url).resolve('axe-core/axe.min.js')

/** Rules of axe that a theme can change; what the others find in one theme they find in both. */
const AXE_COLOUR_RULES = ['color-contrast', 'link-in-text-block']

/** What axe finds on the page, one line a finding: rule, help and the first places. */
async function axeFindings(page: Page, only: 'everything' | 'colours' = 'everything'): Promise<string[]> {
  // By the protocol, not by a script element: the page's own policy would rightly refuse that.
  if (!await page.evaluate(() => 'axe' in window)) await page.evaluate(readAxe())
  const found = await page.evaluate(async (runOnly) => {
    const { axe } = window as unknown as { axe: typeof AxeNamespace }
    const { violations } = await axe.run(document, { runOnly, resultTypes: ['violations'] })
    return violations.map(({ id, help, nodes }) => ({ id, help, places: nodes.slice(0, 3).map(node => `${node.target.join(' ')} ${node.failureSummary ?? ''}`) }))
  }, only === 'everything' ? { type: 'tag' as const, values: AXE_TAGS } : { type: 'rule' as const, values: AXE_COLOUR_RULES })
  return found.map(({ id, help, places }) => `${id}: ${help}\n    ${places.join('\n    ').replaceAll('\n', ' ')}`)
}

let axeSource: string | undefined
function readAxe(): string {
  axeSource ??= readFileSync(AXE, 'utf8')
  return axeSource
}

/** Nothing may scroll sideways. @returns nothing, or by how many pixels the page is too wide and what reaches out */
export async function tooWide(page: Page): Promise<string[]> {
  return page.evaluate(() => {
    const { scrollWidth, clientWidth } = document.documentElement
    if (scrollWidth <= clientWidth) return []
    const reaching = [...document.body.querySelectorAll('*')]
      .filter(element => element.getBoundingClientRect().right > clientWidth + 1)
      .map(element => `${element.tagName.toLowerCase()}.${element.className} to ${Math.round(element.getBoundingClientRect().right)}: ${element.textContent?.trim().slice(0, 60)}`)
    return [`${scrollWidth - clientWidth} px`, ...reaching.slice(-6)]
  })
}

/** Turns the theme and waits until the last colour has faded over. */
async function turn(page: Page, colorScheme: 'light' | 'dark'): Promise<void> {
  await page.emulateMedia({ colorScheme })
  await page.evaluate(async () => {
    const frame = () => new Promise(resolve => requestAnimationFrame(resolve))
    await frame()
    await Promise.allSettled(document.getAnimations().map(animation => animation.finished))
    await frame()
  })
}

/**
 * The page as it stands, in every width and in light and dark: nothing scrolls sideways, axe finds nothing, and a
 * picture of each is kept.
 */
export async function fits(page: Page, name: string, widths: readonly number[] = WIDTHS): Promise<void> {
  await page.evaluate(() => document.fonts.ready)
  for (const width of widths) {
    await page.setViewportSize(sizeOf(width))
    await turn(page, 'light')
    expect(await tooWide(page), `${name} at ${width} scrolls sideways`).toEqual([])
    expect(await axeFindings(page), `${name} at ${width} in light`).toEqual([])
    await shot(page, `${name}-${width}-light`)
    await turn(page, 'dark')
    expect(await axeFindings(page, 'colours'), `${name} at ${width} in dark`).toEqual([])
    await shot(page, `${name}-${width}-dark`)
  }
}

/** A picture of the whole page, kept in .cache/screenshots for looking at. */
export async function shot(page: Page, name: string): Promise<void> {
  mkdirSync(SHOTS, { recursive: true })
  await page.screenshot({ path: path.join(SHOTS, `${name}.png`), fullPage: true })
}

import type { Registry } from '../composition'

/** A public page as it was answered, whole. */
export interface KeptPage {
  readonly body: string
  readonly headers: Readonly<Record<string, string>>
}

/** Characters of HTML that one process keeps of a registry's pages; the longest unread go first. */
const MOST_CHARACTERS = 24_000_000

/**
 * Longest that a page is answered again, in milliseconds: a change of the lists is another key and shows at once; what else
 * a page says, such as the name of a district, is right within this time, as caches outside are told too.
 */
const KEPT_MS = 5_000

/** Public pages of one registry by what they follow from. */
class PageCache {
  readonly #pages = new Map<string, KeptPage & { readonly until: number }>()
  #characters = 0

  get(key: string): KeptPage | undefined {
    const page = this.#pages.get(key)
    if (!page || page.until < performance.now()) return undefined
    this.#pages.delete(key)
    this.#pages.set(key, page)
    return page
  }

  set(key: string, page: KeptPage): void {
    this.#drop(key)
    this.#pages.set(key, { ...page, until: performance.now() + KEPT_MS })
    this.#characters += page.body.length
    for (const oldest of this.#pages.keys()) {
      if (this.#characters <= MOST_CHARACTERS) break
      this.#drop(oldest)
    }
  }

  #drop(key: string): void {
    this.#characters -= this.#pages.get(key)?.body.length ?? 0
    this.#pages.delete(key)
  }
}

const caches = new WeakMap<Registry, PageCache>()

export function pagesOf(registry: Registry): PageCache {
  let cache = caches.get(registry)
  if (!cache) caches.set(registry, cache = new PageCache())
  return cache
}

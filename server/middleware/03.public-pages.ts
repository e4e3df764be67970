import { listsVersion } from '../read-models/records/names'
import { isHeld } from '../utils/etag'
import { pagesOf } from '../utils/pageCache'
import { localeOfRequest } from '../utils/problem'

/** Pages that follow from the lists alone: the first page, the lists, one record. */
const PAGES = /^\/(?:records(?:\/\d+)?)?$/

/**
 * A page of the lists that the caller holds already is not made again, and one that this process has made for anybody is
 * answered as it was: such a page reads no session. While the database is away the page itself says so.
 */
export default defineEventHandler(async (event) => {
  if ((event.method !== 'GET' && event.method !== 'HEAD') || !PAGES.test(event.path.split('?')[0]!)) return
  const { registry } = event.context
  const version = await listsVersion(registry.db).catch(() => null)
  if (version === null) return
  const source = [version, event.path, localeOfRequest(event)]
  if (isHeld(event, source)) {
    setResponseHeader(event, 'cache-control', 'public, max-age=5')
    return null
  }
  const key = JSON.stringify(source)
  const page = pagesOf(registry).get(key)
  if (!page) {
    event.context.pageKey = key
    return
  }
  setResponseHeaders(event, page.headers)
  return page.body
})

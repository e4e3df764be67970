import { listsVersion } from '../read-models/records/names'
import { isHeld } from '../utils/etag'

/** Pages that follow from the lists alone: the first page, the lists, one record. */
const PAGES = /^\/(?:records(?:\/\d+)?)?$/

/**
 * A page of the lists that the caller holds already is not made again. While the database is away the page itself says so.
 */
export default defineEventHandler(async (event) => {
  if ((event.method !== 'GET' && event.method !== 'HEAD') || !PAGES.test(event.path.split('?')[0]!)) return
  const version = await listsVersion(event.context.registry.db).catch(() => null)
  if (version === null) return
  if (!isHeld(event, [version, event.path])) return
  setResponseHeader(event, 'cache-control', 'public, max-age=5')
  return null
})

import { getRequestHeader, sendStream, setResponseHeader, setResponseStatus, type H3Event } from 'h3'
import type { FileToSend } from '../services/documents/read'

/**
 * Sends a stored file to whoever was found to may see it. It is never guessed at, never run, and kept by nobody but the
 * reader's own browser; what a stranger made is saved, not shown.
 */
export async function sendFile(event: H3Event, file: FileToSend): Promise<unknown> {
  const etag = `"${file.etag}"`
  setResponseHeader(event, 'cache-control', 'private, max-age=300')
  setResponseHeader(event, 'etag', etag)
  setResponseHeader(event, 'x-content-type-options', 'nosniff')
  setResponseHeader(event, 'content-security-policy', 'sandbox; default-src \'none\'')
  if (getRequestHeader(event, 'if-none-match') === etag) {
    setResponseStatus(event, 304)
    return null
  }
  setResponseHeader(event, 'content-type', file.mime)
  setResponseHeader(event, 'content-length', file.size)
  const ascii = file.name.replace(/[^\w. -]/g, '_')
  setResponseHeader(event, 'content-disposition', `${file.attachment ? 'attachment' : 'inline'}; filename="${ascii}"; filename*=UTF-8''${encodeURIComponent(file.name)}`)
  return sendStream(event, await file.open())
}

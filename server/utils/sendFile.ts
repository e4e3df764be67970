import { pipeline } from 'node:stream/promises'
import { getRequestHeader, setResponseHeader, setResponseStatus, type H3Event } from 'h3'
import type { FileToSend } from '../services/documents/read'

/**
 * Sends a stored file to whoever was found to may see it. It is never guessed at, never run, and kept by nobody but the
 * reader's own browser; what a stranger made is saved, not shown.
 */
export async function sendFile(event: H3Event, file: FileToSend): Promise<unknown> {
  const etag = `"${file.etag}"`
  const held = getRequestHeader(event, 'if-none-match') === etag
  // Opened before anything is said: where it cannot be, the answer is a problem and has none of the file's headers.
  const stream = held ? null : await file.open()
  setResponseHeader(event, 'cache-control', 'private, max-age=300')
  setResponseHeader(event, 'etag', etag)
  setResponseHeader(event, 'x-content-type-options', 'nosniff')
  setResponseHeader(event, 'content-security-policy', 'sandbox; default-src \'none\'')
  if (!stream) {
    setResponseStatus(event, 304)
    return null
  }
  setResponseHeader(event, 'content-type', file.mime)
  setResponseHeader(event, 'content-length', file.size)
  const ascii = file.name.replace(/[^\w. -]/g, '_')
  setResponseHeader(event, 'content-disposition', `${file.attachment ? 'attachment' : 'inline'}; filename="${ascii}"; filename*=UTF-8''${encodeURIComponent(file.name)}`)
  // Unlike the framework's own sending this closes the file when the reader leaves, and the line when the storage does.
  await pipeline(stream, event.node.res).catch((error: NodeJS.ErrnoException) => {
    if (error.code !== 'ERR_STREAM_PREMATURE_CLOSE') event.context.registry.log.warn({ err: error, path: event.path }, 'a file was broken off')
  })
  return null
}

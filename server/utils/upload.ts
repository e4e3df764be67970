import busboy from 'busboy'
import type { Readable } from 'node:stream'
import { getRequestHeader, type H3Event } from 'h3'
import { DomainError } from '../../shared/errors'

export interface ReadUpload<T> {
  readonly fields: Readonly<Record<string, string>>
  readonly file: T
  readonly name: string | undefined
}

/**
 * Reads a form with exactly one file, as it streams in; nothing of it is held in memory. Fields may stand before or
 * behind the file.
 *
 * @param receive takes the stream in and bounds its size
 * @throws DomainError `bad_request` for anything that is no such form, and whatever `receive` throws
 */
export async function readUpload<T>(event: H3Event, receive: (stream: Readable) => Promise<T>): Promise<ReadUpload<T>> {
  const broken = (cause?: unknown) => new DomainError('bad_request', { details: { reason: 'multipart' }, cause })
  if (!/^multipart\/form-data\b/i.test(getRequestHeader(event, 'content-type') ?? '')) throw broken()
  const request = event.node.req
  const fields: Record<string, string> = {}
  let received: Promise<T> | null = null
  let name: string | undefined
  let form: ReturnType<typeof busboy>
  try {
    form = busboy({ headers: request.headers, limits: { files: 1, fields: 10, fieldSize: 2_000, parts: 12 }, defParamCharset: 'utf8' })
  }
  catch (error) {
    throw broken(error)
  }
  try {
    await new Promise<void>((resolve, reject) => {
      form.on('field', (field, value) => { fields[field] = value })
      form.on('file', (_field, stream, info) => {
        name = info.filename
        received = receive(stream)
        // A refusal ends the reading at once: the rest of a file that is too large is not waited for.
        received.catch((error) => {
          stream.resume()
          reject(error instanceof Error ? error : broken(error))
        })
      })
      form.on('close', resolve)
      form.on('error', error => reject(broken(error)))
      request.on('aborted', () => reject(broken()))
      request.pipe(form)
    })
  }
  catch (error) {
    request.unpipe(form)
    request.resume()
    throw error
  }
  if (!received) throw new DomainError('invalid_input', { fields: [{ path: 'file', code: 'required' }] })
  return { fields, file: await (received as Promise<T>), name }
}

import { open } from 'node:fs/promises'
import { fileTypeFromBuffer } from 'file-type'
import { DomainError } from '../../../shared/errors'

export const TAKEN = { 'image/jpeg': 'image', 'image/png': 'image', 'image/webp': 'image', 'application/pdf': 'pdf' } as const
export type TakenType = keyof typeof TAKEN

const HEAD_BYTES = 64 * 1024
const LOOKS_LIKE_SVG = /^(?:\uFEFF)?\s*(?:<\?xml[^>]*>\s*)?(?:<!--[\s\S]*?-->\s*)*(?:<!DOCTYPE\s+svg[^>]*>\s*)?<svg[\s>]/i

/**
 * What a file is by its content; its name and what the browser says of it are not looked at.
 *
 * @throws DomainError `file_kind` for anything but JPEG, PNG, WebP and PDF, with the way out for HEIC and SVG
 */
export async function typeOf(file: string): Promise<TakenType> {
  const handle = await open(file, 'r')
  const head = Buffer.alloc(HEAD_BYTES)
  const { bytesRead } = await handle.read(head, 0, HEAD_BYTES, 0).finally(() => handle.close())
  if (bytesRead === 0) throw new DomainError('file_unreadable', { details: { reason: 'empty' } })
  const bytes = head.subarray(0, bytesRead)
  const found = await fileTypeFromBuffer(bytes)
  if (found && found.mime in TAKEN) return found.mime as TakenType
  if (found && /^image\/(?:heic|heif|avif)/.test(found.mime)) throw new DomainError('file_kind', { details: { reason: 'heic' } })
  if (LOOKS_LIKE_SVG.test(bytes.toString('utf8'))) throw new DomainError('file_kind', { details: { reason: 'svg' } })
  throw new DomainError('file_kind')
}

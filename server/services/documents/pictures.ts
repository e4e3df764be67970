import sharp from 'sharp'
import { DomainError } from '../../../shared/errors'
import { LIMITS } from './limits'

export interface Picture {
  readonly bytes: Buffer
  readonly mime: 'image/jpeg' | 'image/webp'
  readonly width: number
  readonly height: number
}

// One picture at a time a thread, and none kept: a server with little memory must live through many uploads.
sharp.cache(false)
sharp.concurrency(1)

const open = (source: string | Buffer) => sharp(source, { limitInputPixels: LIMITS.pixels, failOn: 'error', animated: false, sequentialRead: true })

/**
 * A photograph as it is kept: upright by its own mark, unpacked and packed anew, so that nothing but the picture is
 * left: no place, no camera, no owner, no hidden content. A transparent picture stays WebP, every other is a JPEG.
 *
 * @throws DomainError `file_unreadable`
 */
export async function keepPicture(source: string): Promise<Picture> {
  try {
    const { width, height, hasAlpha } = await open(source).metadata()
    if (width * height > LIMITS.pixels) throw tooManyPixels()
    const upright = open(source).autoOrient().resize({ width: LIMITS.side, height: LIMITS.side, fit: 'inside', withoutEnlargement: true }).toColourspace('srgb')
    const { data, info } = await (hasAlpha ? upright.webp({ quality: 88 }) : upright.jpeg({ quality: 88, mozjpeg: false })).toBuffer({ resolveWithObject: true })
    return { bytes: data, mime: hasAlpha ? 'image/webp' : 'image/jpeg', width: info.width, height: info.height }
  }
  catch (error) {
    throw asRefusal(error)
  }
}

/** A small picture for lists. */
export async function thumbnailOf(source: string | Buffer): Promise<Picture> {
  try {
    const { data, info } = await open(source).autoOrient()
      .resize({ width: LIMITS.thumbnailSide, height: LIMITS.thumbnailSide, fit: 'inside', withoutEnlargement: true })
      .flatten({ background: '#ffffff' }).webp({ quality: 72 }).toBuffer({ resolveWithObject: true })
    return { bytes: data, mime: 'image/webp', width: info.width, height: info.height }
  }
  catch (error) {
    throw asRefusal(error)
  }
}

function tooManyPixels(): DomainError {
  return new DomainError('file_unreadable', { details: { reason: 'pixels', maximum: LIMITS.pixels / 1_000_000 } })
}

function asRefusal(error: unknown): DomainError {
  if (error instanceof DomainError) return error
  const message = error instanceof Error ? error.message : String(error)
  if (/pixel limit/i.test(message)) return tooManyPixels()
  return new DomainError('file_unreadable', { details: { reason: 'image' }, logLine: message, cause: error })
}

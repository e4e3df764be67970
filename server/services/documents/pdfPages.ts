import { spawn } from 'node:child_process'
import { mkdtemp, readdir, rm } from 'node:fs/promises'
import os from 'node:os'
import path from 'node:path'
import sharp from 'sharp'
import { DomainError } from '../../../shared/errors'
import { LIMITS } from './limits'
import type { Picture } from './pictures'

const LONGEST_OUTPUT = 20_000
const MEMORY_BYTES = 1024 * 1024 * 1024

interface Ended { readonly code: number | null, readonly output: string, readonly missing: boolean }

/** Runs one of poppler's programs under bounds of time and memory; a file from a stranger must not take the machine. */
function run(program: string, args: readonly string[], bounded = true): Promise<Ended> {
  const [command, given] = bounded
    ? ['prlimit', [`--as=${MEMORY_BYTES}`, `--cpu=${Math.ceil(LIMITS.pdfMs / 1000)}`, program, ...args]] as const
    : [program, args] as const
  return new Promise((resolve) => {
    const child = spawn(command, given, { stdio: ['ignore', 'pipe', 'pipe'], timeout: LIMITS.pdfMs, killSignal: 'SIGKILL', env: { PATH: process.env.PATH ?? '', LC_ALL: 'C' } })
    let output = ''
    const read = (chunk: Buffer) => { if (output.length < LONGEST_OUTPUT) output += chunk.toString('latin1') }
    child.stdout.on('data', read)
    child.stderr.on('data', read)
    child.on('error', error => resolve({ code: null, output: error.message, missing: (error as NodeJS.ErrnoException).code === 'ENOENT' }))
    child.on('close', code => resolve({ code, output, missing: false }))
  })
}

let present: Promise<boolean> | undefined
/** Whether this machine can make pictures of pages; without it a PDF can only be saved, which is said where it is shown. */
export function canShowPages(): Promise<boolean> {
  present ??= run('pdftoppm', ['-v'], false).then(({ missing }) => !missing)
  return present
}

function unreadable(reason: 'pdf' | 'pages', logLine?: string): DomainError {
  return new DomainError('file_unreadable', { details: { reason, ...(reason === 'pages' ? { maximum: LIMITS.pdfPages } : {}) }, logLine })
}

/**
 * Pictures of the pages of a PDF. The PDF itself is never shown in a browser: what runs in it would run at the reader's.
 *
 * @returns one picture a page, or null where poppler is not installed
 * @throws DomainError `file_unreadable` for a damaged or locked file, or one of too many pages
 */
export async function picturesOfPages(file: string): Promise<Picture[] | null> {
  if (!await canShowPages()) return null
  const info = await run('pdfinfo', [file])
  const pages = Number(/^Pages:\s+(\d+)/m.exec(info.output)?.[1])
  if (info.code !== 0 || !Number.isInteger(pages) || pages < 1) throw unreadable('pdf', info.output.slice(0, 300))
  if (pages > LIMITS.pdfPages) throw unreadable('pages')
  const folder = await mkdtemp(path.join(os.tmpdir(), 'hartroll-pages-'))
  try {
    const made = await run('pdftoppm', ['-png', '-scale-to', String(LIMITS.pageSide), '-l', String(LIMITS.pdfPages), file, path.join(folder, 'page')])
    const names = (await readdir(folder)).sort()
    if (made.code !== 0 || names.length !== pages) throw unreadable('pdf', made.output.slice(0, 300))
    const pictures: Picture[] = []
    for (const name of names) {
      const { data, info: size } = await sharp(path.join(folder, name)).flatten({ background: '#ffffff' }).webp({ quality: 80 }).toBuffer({ resolveWithObject: true })
      pictures.push({ bytes: data, mime: 'image/webp', width: size.width, height: size.height })
    }
    return pictures
  }
  finally {
    await rm(folder, { recursive: true, force: true })
  }
}

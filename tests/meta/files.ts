import { execFileSync } from 'node:child_process'
import { existsSync } from 'node:fs'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { filesUnder } from '../../scripts/lib/sources.mjs'

export const ROOT = fileURLToPath(new URL('../..', import.meta.url))

const IGNORED = /^(?:node_modules|\.nuxt|\.output|\.data|\.cache|reports|coverage)(?:\/|$)/

/** Files of the program by ending, as paths from the root; what git ignores is left out. */
export function filesOf(endings: readonly string[]): string[] {
  const listed = existsSync(path.join(ROOT, '.git'))
    ? execFileSync('git', ['ls-files', '--cached', '--others', '--exclude-standard'], { cwd: ROOT, encoding: 'utf8' }).split('\n').filter(Boolean)
    : filesUnder(ROOT).map(file => path.relative(ROOT, file))
  return listed.filter(file => endings.some(ending => file.endsWith(ending)) && !IGNORED.test(file) && existsSync(path.join(ROOT, file))).sort()
}

import { createHash } from 'node:crypto'
import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs'
import path from 'node:path'

/** Everything that a build is made from. */
const BUILT_FROM = [
  'app.vue', 'error.vue', 'nuxt.config.ts', 'tailwind.config.ts', 'tsconfig.json', 'package.json', 'package-lock.json',
  'assets', 'components', 'composables', 'i18n', 'layouts', 'middleware', 'pages', 'plugins', 'public', 'stores', 'utils',
  'db', 'modules', 'patches', 'seeds', 'server', 'shared', 'scripts/build.mjs',
  'scripts/cli.ts', 'scripts/commands.ts', 'scripts/demo.ts',
]

/**
 * A digest of the sources: alike exactly when a build of them would be.
 *
 * @param {string} root
 * @param {readonly string[]} [targets]
 * @returns {string}
 */
export function sourcesDigest(root, targets = BUILT_FROM) {
  const hash = createHash('sha256').update(process.version)
  for (const target of targets) {
    for (const file of filesUnder(path.join(root, target))) {
      hash.update(path.relative(root, file)).update('\0').update(readFileSync(file)).update('\0')
    }
  }
  return hash.digest('hex').slice(0, 32)
}

/** @param {string} target @returns {string[]} files under it, in one order on every machine */
export function filesUnder(target) {
  if (!existsSync(target)) return []
  if (statSync(target).isFile()) return [target]
  return readdirSync(target).sort().filter(name => !name.startsWith('.')).flatMap(name => filesUnder(path.join(target, name)))
}

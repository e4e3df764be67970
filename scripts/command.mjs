/**
 * Runs a command of the program against the registry that `npm start` runs, or the one of DATABASE_URL:
 * `npm run registrar -- MAIL`, `npm run check`.
 */
import { existsSync, readFileSync } from 'node:fs'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { childEnvironment } from './lib/childEnvironment.mjs'
import { readEnvironment } from './lib/environment.mjs'
import { run } from './lib/processes.mjs'
import { failWith, StartError } from './lib/report.mjs'

const ROOT = fileURLToPath(new URL('..', import.meta.url))

try {
  const wishes = readEnvironment(process.env, ROOT)
  const env = childEnvironment(wishes, read('instance.json', wishes.dataDir))
  if (wishes.databaseUrl === null) {
    const { databaseUrl } = read('running.json', wishes.dataDir)
    if (!databaseUrl) throw new StartError(`Hartroll is not running on the data folder ${wishes.dataDir}; start it first, with the same HARTROLL_DATA`)
    env.DATABASE_URL = databaseUrl
    env.HARTROLL_OWN_DATABASE = '1'
  }
  const bundle = path.join(ROOT, '.output', 'cli', 'index.mjs')
  const program = existsSync(bundle) ? [bundle] : ['--import', 'tsx', path.join(ROOT, 'scripts', 'cli.ts')]
  const { code } = await run(process.execPath, [...program, ...process.argv.slice(2)], { cwd: ROOT, env, quiet: false })
  process.exit(code)
}
catch (error) {
  failWith(error)
}

/** @param {string} name @param {string} folder */
function read(name, folder) {
  const file = path.join(folder, name)
  if (!existsSync(file)) throw new StartError(`Hartroll is not running on the data folder ${folder}; start it first, with the same HARTROLL_DATA`)
  return JSON.parse(readFileSync(file, 'utf8'))
}

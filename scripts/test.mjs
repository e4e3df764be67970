/**
 * `npm test`: sets itself up as `npm start` does, without the demo, and runs everything. The last line says how many
 * tests passed and failed; a check that is no Vitest test counts as one, and so does a step that breaks.
 * `npm test -- unit db` runs only the steps named.
 */
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { ensureBuild } from './build.mjs'
import { installDebian, installMariadbServer } from './lib/debian.mjs'
import { ensurePackages } from './lib/packages.mjs'
import { endCommands, run } from './lib/processes.mjs'
import { describe, failWith, say, seconds, step, StartError } from './lib/report.mjs'
import { hasMariadb } from './mariadb.mjs'

const ROOT = fileURLToPath(new URL('..', import.meta.url))
const REPORTS = path.join(ROOT, '.cache', 'reports')
const CHROMIUM = process.env.CHROMIUM ?? '/usr/bin/chromium'

/** @typedef {{ passed: number, failed: number }} Count */
/** @typedef {{ name: string, does: string, run: () => Promise<Count> }} Step */

/** @type {Step[]} */
const STEPS = [
  { name: 'lint', does: 'Lint, with who may import whom', run: () => check('node_modules/eslint/bin/eslint.js', ['.', '--cache', '--cache-location', '.cache/eslint', '--max-warnings', '0']) },
  { name: 'types', does: 'Type check', run: () => check('node_modules/nuxt/bin/nuxt.mjs', ['typecheck']) },
  { name: 'unused', does: 'Files, exports and packages that nothing uses', run: () => check('node_modules/knip/bin/knip.js', ['--no-progress']) },
  { name: 'meta', does: 'Rules of the house', run: () => vitest('meta') },
  { name: 'unit', does: 'Unit tests', run: () => vitest('unit') },
  { name: 'standards', does: 'Published rules and worked examples', run: () => vitest('standards') },
  { name: 'db', does: 'Database tests', run: () => vitest('db') },
  { name: 'api', does: 'API tests', run: () => vitest('api') },
  { name: 'browser', does: 'Browser tests', run: () => vitest('browser') },
  { name: 'faults', does: 'kill -9 at random moments under load', run: () => check('scripts/kill-trials.mjs', ['20']) },
]

const wanted = process.argv.slice(2)
const unknown = wanted.find(name => !STEPS.some(({ name: known }) => known === name))
if (unknown) failWith(new StartError(`There is no step "${unknown}"; there are ${STEPS.map(({ name }) => name).join(', ')}`))

for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP'])) {
  process.on(signal, async () => {
    await endCommands()
    process.exit(130)
  })
}

const begun = Date.now()
const total = { passed: 0, failed: 0 }
try {
  await setUp()
  for (const { name, does, run: work } of STEPS.filter(({ name }) => wanted.length === 0 || wanted.includes(name))) {
    say(`\n── ${does} (${name})`)
    const from = Date.now()
    const { passed, failed } = await work().catch((error) => {
      process.stderr.write(describe(error))
      return { passed: 0, failed: 1 }
    })
    total.passed += passed
    total.failed += failed
    say(`   ${name}: ${passed} passed, ${failed} failed in ${seconds(Date.now() - from)}`)
  }
}
catch (error) {
  process.stderr.write(describe(error))
  total.failed++
}
say(`\nIn ${seconds(Date.now() - begun)}:`)
say(`${total.passed} passed, ${total.failed} failed`)
process.exit(total.failed === 0 && total.passed > 0 ? 0 : 1)

async function setUp() {
  // Debian's packages first: whoever may not install them is told at once, not after a minute of node packages.
  if (!hasMariadb()) await installMariadbServer()
  if (!existsSync(CHROMIUM)) await installDebian(['chromium'], 'Chromium, in which the pages are tested,', 'chromium')
  if (!existsSync('/usr/bin/pdftotext')) await installDebian(['poppler-utils'], 'pdftotext, with which papers are tested,', 'poppler-utils')
  await ensurePackages(ROOT)
  mkdirSync(REPORTS, { recursive: true })
  await ensureBuild()
  if (!existsSync(path.join(ROOT, '.nuxt', 'eslint.config.mjs'))) {
    await step('Preparing types', async () => {
      const { code, output } = await run(process.execPath, ['node_modules/nuxt/bin/nuxt.mjs', 'prepare'], { cwd: ROOT })
      if (code !== 0) throw new StartError(`nuxt prepare failed: ${output.trim().split('\n').at(-1)}`)
    })
  }
}

/**
 * A check that passes or fails as a whole.
 *
 * @param {string} program of node
 * @param {string[]} args
 * @returns {Promise<Count>}
 */
async function check(program, args) {
  const { code } = await run(process.execPath, [path.join(ROOT, program), ...args], { cwd: ROOT, quiet: false })
  return code === 0 ? { passed: 1, failed: 0 } : { passed: 0, failed: 1 }
}

/**
 * The tests of one folder, counted from Vitest's own report; without a report, or with an exit code that the report
 * does not explain, something broke and counts as a failure.
 *
 * @param {string} project
 * @returns {Promise<Count>}
 */
async function vitest(project) {
  const report = path.join(REPORTS, `${project}.json`)
  rmSync(report, { force: true })
  const { code } = await run(process.execPath, [
    path.join(ROOT, 'node_modules/vitest/vitest.mjs'), 'run', '--project', project,
    '--reporter=default', '--reporter=json', `--outputFile.json=${report}`,
  ], { cwd: ROOT, quiet: false, env: { ...process.env, CI: '1' } })
  if (!existsSync(report)) return { passed: 0, failed: 1 }
  const { numPassedTests: passed, numFailedTests: failedTests, testResults } = JSON.parse(readFileSync(report, 'utf8'))
  // A file that cannot be loaded has failed without one of its tests having run.
  const broken = testResults.filter((/** @type {{ status: string, assertionResults: { status: string }[] }} */ file) =>
    file.status === 'failed' && !file.assertionResults.some(test => test.status === 'failed')).length
  const failed = failedTests + broken
  return { passed, failed: failed === 0 && code !== 0 ? 1 : failed }
}

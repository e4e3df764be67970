/**
 * Builds what runs in production: the web (Nuxt), the worker and the command line, each one file that starts at once.
 * Does nothing when the build at hand was made from the sources at hand.
 */
import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { fileURLToPath, pathToFileURL } from 'node:url'
import { failWith, say, StartError, step } from './lib/report.mjs'
import { ensurePackages } from './lib/packages.mjs'
import { commandLine, endCommands, isAlive, run, sleep } from './lib/processes.mjs'
import { sourcesDigest } from './lib/sources.mjs'

const ROOT = fileURLToPath(new URL('..', import.meta.url))
const OUTPUT = path.join(ROOT, '.output')
const STAMP = path.join(OUTPUT, 'sources.txt')

/** @returns {boolean} whether the build was made from the sources as they are now */
export function buildIsCurrent() {
  return existsSync(STAMP) && readFileSync(STAMP, 'utf8') === sourcesDigest(ROOT)
}

/**
 * Builds when needed. Two copies that start from one folder wait for each other.
 *
 * @returns {Promise<boolean>} whether anything was built
 */
export async function ensureBuild() {
  if (buildIsCurrent()) return false
  return withLock(async () => {
    if (buildIsCurrent()) return false
    const digest = sourcesDigest(ROOT)
    rmSync(STAMP, { force: true })
    await step('Building the pages and the server (about a minute)', buildWeb)
    await step('Building the worker and the command line', buildPrograms)
    writeFileSync(STAMP, digest)
    return true
  })
}

async function buildWeb() {
  const { code, output } = await run(process.execPath, [path.join(ROOT, 'node_modules/nuxt/bin/nuxt.mjs'), 'build'], {
    cwd: ROOT,
    env: { ...process.env, NODE_ENV: 'production', NUXT_TELEMETRY_DISABLED: '1', CI: '1' },
  })
  if (code !== 0) {
    mkdirSync(path.join(ROOT, '.cache'), { recursive: true })
    const log = path.join(ROOT, '.cache', 'build.log')
    writeFileSync(log, output)
    const reason = output.split('\n').find(line => /error/i.test(line))?.trim() ?? 'no reason given'
    throw new StartError(`The build failed: ${reason} (all of it in ${log})`)
  }
}

async function buildPrograms() {
  const { build } = await import('esbuild')
  await build({
    absWorkingDir: ROOT,
    entryPoints: { 'worker/index': 'server/worker.ts', 'cli/index': 'scripts/cli.ts' },
    outdir: '.output',
    outExtension: { '.js': '.mjs' },
    bundle: true,
    splitting: false,
    platform: 'node',
    format: 'esm',
    target: 'node20',
    // Packages stay in node_modules: native ones cannot be bundled, and they are installed anyway.
    packages: 'external',
    plugins: [keepSharedInside()],
    loader: { '.json': 'json' },
    sourcemap: 'linked',
    logLevel: 'silent',
  }).catch((/** @type {Error} */ error) => {
    throw new StartError(`The worker could not be built: ${error.message.split('\n').slice(0, 2).join(' ')}`)
  })
}

/**
 * `#shared/…` looks like a package to esbuild's "external packages"; it is ours.
 *
 * @returns {import('esbuild').Plugin}
 */
function keepSharedInside() {
  return {
    name: 'shared-inside',
    setup(build) {
      build.onResolve({ filter: /^#shared\// }, ({ path: wanted }) => ({ path: path.join(ROOT, 'shared', `${wanted.slice('#shared/'.length)}.ts`) }))
    },
  }
}

/**
 * @template T
 * @param {() => Promise<T>} work
 * @returns {Promise<T>}
 */
async function withLock(work) {
  const lock = path.join(ROOT, '.cache', 'build.lock')
  mkdirSync(path.dirname(lock), { recursive: true })
  for (let told = false; ; told = true) {
    try {
      writeFileSync(lock, String(process.pid), { flag: 'wx' })
      break
    }
    catch (error) {
      if (/** @type {NodeJS.ErrnoException} */ (error).code !== 'EEXIST') throw error
      const holder = Number(existsSync(lock) ? readFileSync(lock, 'utf8') : 0)
      if (!holder || !isAlive(holder) || !commandLine(holder).includes('scripts/')) {
        rmSync(lock, { force: true })
        continue
      }
      if (!told) say(`  Another copy is building (process ${holder}); waiting for it`)
      await sleep(500)
    }
  }
  try {
    return await work()
  }
  finally {
    rmSync(lock, { force: true })
  }
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) {
  for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP'])) {
    process.on(signal, async () => {
      await endCommands()
      process.exit(130)
    })
  }
  try {
    await ensurePackages(ROOT)
    if (!await ensureBuild()) say('  The build is current')
  }
  catch (error) {
    failWith(error)
  }
}

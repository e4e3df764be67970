import { existsSync, lstatSync, readFileSync } from 'node:fs'
import path from 'node:path'
import { StartError, step } from './report.mjs'
import { run } from './processes.mjs'

/**
 * Whether node_modules holds what package-lock.json names, told from the list that npm keeps of what it installed.
 *
 * @param {string} root
 * @returns {boolean}
 */
export function packagesAreCurrent(root) {
  const installed = path.join(root, 'node_modules', '.package-lock.json')
  if (!existsSync(installed)) return false
  const wanted = JSON.parse(readFileSync(path.join(root, 'package-lock.json'), 'utf8')).packages
  const present = JSON.parse(readFileSync(installed, 'utf8')).packages
  return Object.entries(wanted).every(([where, { version, optional, link }]) =>
    where === '' || optional || link || present[where]?.version === version)
}

/**
 * Installs the node packages when they are missing or the lock has changed.
 *
 * @param {string} root
 */
export async function ensurePackages(root) {
  if (packagesAreCurrent(root)) return
  const folder = path.join(root, 'node_modules')
  if (existsSync(folder) && lstatSync(folder).isSymbolicLink()) {
    throw new StartError('node_modules is a link to a folder that does not fit package-lock.json; install the packages there or remove the link')
  }
  await step('Installing node packages (npm ci)', async () => {
    const { code, output } = await run('npm', ['ci', '--include=dev', '--no-audit', '--no-fund'], { cwd: root, env: npmEnvironment() })
    if (code !== 0) {
      const reason = output.split('\n').find(line => /^npm error(?! code)/i.test(line)) ?? output.trim().split('\n').at(-1)
      throw new StartError(`The node packages could not be installed: ${reason}`)
    }
  })
}

/** npm hands its own settings down as variables; a run inside `npm start` must not take them for wishes. */
function npmEnvironment() {
  return Object.fromEntries(Object.entries(process.env).filter(([name]) => !/^npm_(config|package|lifecycle|command)/.test(name) && name !== 'NODE_ENV'))
}

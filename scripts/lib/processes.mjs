import { spawn, spawnSync } from 'node:child_process'
import { existsSync, readFileSync } from 'node:fs'

/** @param {number} ms @returns {Promise<void>} */
export const sleep = (ms) => new Promise((resolve) => setTimeout(resolve, ms))

/** @param {string} command @returns {boolean} whether a command of this name is on the PATH */
export function onPath(command) {
  const folders = `${process.env.PATH ?? ''}:/usr/sbin:/sbin:/usr/bin:/bin`.split(':')
  return folders.some(folder => folder !== '' && existsSync(`${folder}/${command}`))
}

/** @param {number} pid @returns {boolean} */
export function isAlive(pid) {
  try {
    process.kill(pid, 0)
  }
  catch (error) {
    return /** @type {NodeJS.ErrnoException} */ (error).code === 'EPERM'
  }
  // A zombie still has a pid; it holds neither port nor file.
  try {
    return !/^State:\s+Z/m.test(readFileSync(`/proc/${pid}/status`, 'utf8'))
  }
  catch {
    return true
  }
}

/**
 * The command line of a process, for telling our own orphan from a stranger that got its pid.
 *
 * @param {number} pid
 * @returns {string} arguments joined by spaces, empty when there is no such process
 */
export function commandLine(pid) {
  try {
    return readFileSync(`/proc/${pid}/cmdline`, 'utf8').replaceAll('\0', ' ')
  }
  catch {
    return ''
  }
}

/**
 * Asks a process to end and makes sure that it did.
 *
 * @param {number} pid
 * @param {number} graceMs time between SIGTERM and SIGKILL
 * @returns {Promise<boolean>} whether it ended by itself
 */
export async function endProcess(pid, graceMs) {
  if (!isAlive(pid)) return true
  trySignal(pid, 'SIGTERM')
  const until = Date.now() + graceMs
  while (Date.now() < until) {
    await sleep(25)
    if (!isAlive(pid)) return true
  }
  trySignal(pid, 'SIGKILL')
  while (isAlive(pid)) await sleep(25)
  return false
}

/** @param {number} pid @param {NodeJS.Signals} signal */
export function trySignal(pid, signal) {
  try {
    process.kill(pid, signal)
  }
  catch {
    // It is gone already, which is what was wanted.
  }
}

/**
 * Puts `setpriv --pdeathsig` before a command where it exists, so that the child is told to end
 * even when this process is killed without a chance to tell it.
 *
 * @param {string} command
 * @param {string[]} args
 * @returns {[string, string[]]}
 */
export function tiedToParent(command, args) {
  return onPath('setpriv') ? ['setpriv', ['--pdeathsig', 'TERM', '--', command, ...args]] : [command, args]
}

/** @type {Set<import('node:child_process').ChildProcess>} commands that run at this moment */
const underWay = new Set()

/**
 * Runs a command to its end.
 *
 * @param {string} command
 * @param {string[]} args
 * @param {import('node:child_process').SpawnOptions & { quiet?: boolean, lasting?: boolean }} [options]
 *   quiet: keep the output and give it back; lasting: not to be cut short, not even when everything stops
 * @returns {Promise<{ code: number, output: string }>} code 127 when the command could not be started
 */
export function run(command, args, { quiet = true, lasting = false, ...options } = {}) {
  return new Promise((resolve) => {
    const [program, argv] = lasting ? [command, args] : tiedToParent(command, args)
    // A group of its own: Ctrl-C reaches this process alone, which then ends what it started in order.
    const child = spawn(program, argv, { stdio: quiet ? ['ignore', 'pipe', 'pipe'] : ['ignore', 'inherit', 'inherit'], detached: true, ...options })
    if (!lasting) underWay.add(child)
    let output = ''
    child.stdout?.on('data', chunk => (output += chunk))
    child.stderr?.on('data', chunk => (output += chunk))
    child.once('error', error => resolve({ code: 127, output: `${output}${error.message}` }))
    child.once('close', (code, signal) => {
      underWay.delete(child)
      resolve({ code: code ?? (signal ? 1 : 0), output })
    })
  })
}

/** Ends the commands that `run` still waits for, with whatever they started themselves. */
export async function endCommands() {
  const ending = [...underWay].filter(child => child.pid !== undefined)
  for (const child of ending) trySignal(-(/** @type {number} */ (child.pid)), 'SIGTERM')
  await Promise.race([Promise.all(ending.map(child => new Promise(resolve => child.once('close', resolve)))), sleep(2_000)])
  for (const child of underWay) if (child.pid !== undefined) trySignal(-child.pid, 'SIGKILL')
}

/**
 * User and group id of an account of this machine.
 *
 * @param {string} name
 * @returns {{ uid: number, gid: number } | null}
 */
export function accountIds(name) {
  const line = spawnSync('getent', ['passwd', name], { encoding: 'utf8' }).stdout?.trim()
  if (!line) return null
  const [, , uid, gid] = line.split(':')
  return { uid: Number(uid), gid: Number(gid) }
}

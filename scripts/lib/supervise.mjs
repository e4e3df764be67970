import { spawn } from 'node:child_process'
import { openSync } from 'node:fs'
import { endProcess, sleep, tiedToParent } from './processes.mjs'

/**
 * A part that ends of itself this often within a minute has a fault that starting it again does not cure. One that was
 * killed from outside has none: it only waits longer each time.
 */
const MOST_RESTARTS = 6
const WINDOW_MS = 60_000

/**
 * @typedef {object} Part
 * @property {string} name
 * @property {() => number | undefined} pid
 * @property {() => Promise<void>} stop
 */

/**
 * Keeps a Node program running: when it ends by itself it is started again, ever more slowly.
 *
 * @param {object} options
 * @param {string} options.name
 * @param {string[]} options.args of node
 * @param {NodeJS.ProcessEnv} options.env
 * @param {string} options.cwd
 * @param {string | null} options.logFile null: on this terminal
 * @param {number} options.graceMs from SIGTERM to SIGKILL
 * @param {(line: string) => void} options.onEvent
 * @param {(name: string) => void} options.onGivenUp
 * @param {(pid: number) => void} [options.onStart]
 * @returns {Part}
 */
export function keepRunning({ name, args, env, cwd, logFile, graceMs, onEvent, onGivenUp, onStart }) {
  let stopping = false
  /** @type {import('node:child_process').ChildProcess | undefined} */
  let child
  /** @type {{ at: number, ofItself: boolean }[]} */
  const ends = []

  const start = () => {
    const out = logFile === null ? 'inherit' : openSync(logFile, 'a')
    const [command, argv] = tiedToParent(process.execPath, args)
    child = spawn(command, argv, { cwd, env, stdio: ['ignore', out, out], detached: true })
    if (child.pid) onStart?.(child.pid)
    child.once('error', () => {})
    child.once('exit', async (code, signal) => {
      if (stopping) return
      const now = Date.now()
      ends.push({ at: now, ofItself: signal === null })
      while (ends[0] !== undefined && ends[0].at < now - WINDOW_MS) ends.shift()
      if (ends.filter(end => end.ofItself).length > MOST_RESTARTS) {
        onGivenUp(name)
        return
      }
      onEvent(`The ${name} ended (${signal ?? `code ${code}`}); starting it again`)
      await sleep(Math.min(100 * 2 ** (ends.length - 1), 5_000))
      if (!stopping) start()
    })
  }
  start()

  return {
    name,
    pid: () => child?.pid,
    stop: async () => {
      stopping = true
      if (child?.pid && child.exitCode === null && child.signalCode === null) await endProcess(child.pid, graceMs)
    },
  }
}

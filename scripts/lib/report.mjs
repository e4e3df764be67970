/**
 * What a person at a terminal sees. One line a step, one line a failure: whoever starts Hartroll
 * for the first time should never have to read a stack trace to learn that a port is taken.
 */

/** A failure that the person can put right: printed as its one line, without a stack. */
export class StartError extends Error {}

/**
 * Runs a step that may take long, saying what it is before and how long it took after.
 *
 * @template T
 * @param {string} label what is being done, e.g. 'Installing node packages'
 * @param {() => Promise<T>} work
 * @returns {Promise<T>}
 */
export async function step(label, work) {
  const begun = Date.now()
  process.stdout.write(`  ${label} …\n`)
  // A step that is silent for long looks hung: say every ten seconds that it is not.
  const still = setInterval(() => {
    process.stdout.write(`  ${label} … ${Math.round((Date.now() - begun) / 1000)} s\n`)
  }, 10_000)
  try {
    const result = await work()
    process.stdout.write(`  ${label}: done in ${seconds(Date.now() - begun)}\n`)
    return result
  }
  finally {
    clearInterval(still)
  }
}

/** @param {string} line */
export function say(line) {
  process.stdout.write(`${line}\n`)
}

/**
 * Ends the process for a failure: one line for what a person can put right, the stack for a defect.
 *
 * @param {unknown} error
 * @returns {never}
 */
export function failWith(error) {
  process.stderr.write(describe(error))
  process.exit(1)
}

/** @param {unknown} error @returns {string} */
export function describe(error) {
  if (error instanceof StartError) return `hartroll: ${error.message}\n`
  return `hartroll: unexpected failure: ${error instanceof Error ? error.stack : String(error)}\n`
}

/** @param {number} ms @returns {string} e.g. '1.8 s' */
export function seconds(ms) {
  return `${(ms / 1000).toFixed(1)} s`
}

import { existsSync } from 'node:fs'
import { say, StartError, step } from './report.mjs'
import { accountIds, onPath, run } from './processes.mjs'

const ENV = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' }

/** @returns {boolean} */
const isRoot = () => process.getuid?.() === 0

/**
 * Installs a Debian package, or says in one line which one is missing.
 *
 * @param {string[]} packages what is installed
 * @param {string} what what it is for, as in 'MariaDB server is missing'
 * @param {string} named the package a person is told to install
 * @returns {Promise<void>}
 * @throws {StartError} as an ordinary user, without apt-get, or when the installation fails
 */
export async function installDebian(packages, what, named) {
  const hint = `${what} is missing; install the Debian package ${named} (apt-get install ${named}) and start again`
  if (!isRoot() || !existsSync('/usr/bin/apt-get')) throw new StartError(hint)
  await step(`Installing ${packages.join(', ')} from Debian`, async () => {
    const install = () => run('apt-get', ['install', '-y', '--no-install-recommends', ...packages], { env: ENV, lasting: true })
    let result = await install()
    if (result.code !== 0) {
      await run('apt-get', ['update'], { env: ENV, lasting: true })
      result = await install()
    }
    if (result.code !== 0) {
      const last = result.output.trim().split('\n').filter(line => line.startsWith('E:')).at(-1) ?? ''
      throw new StartError(`${hint}; installing it here failed: ${last}`)
    }
  })
}

/** Poppler's programs, which make pictures of the pages of PDF papers; without them the registry runs, and says so. */
export async function offerPoppler() {
  if (onPath('pdftoppm')) return
  try {
    await installDebian(['poppler-utils'], 'pdftoppm, which makes pictures of PDF papers,', 'poppler-utils')
  }
  catch (error) {
    if (!(error instanceof StartError)) throw error
    say('  pdftoppm is missing (Debian package poppler-utils): papers in PDF are kept, but not shown page by page')
  }
}

/**
 * MariaDB's server alone: the core packages bring the program without registering or starting a
 * system-wide server that nobody asked for.
 */
export async function installMariadbServer() {
  await installDebian(['mariadb-server-core', 'mariadb-client-core'], 'MariaDB\'s server', 'mariadb-server')
  if (!accountIds('mysql')) {
    // The account Debian's own mariadb-server package would make, found by it if it comes later.
    const made = await run('useradd', ['--system', '--user-group', '--no-create-home', '--home-dir', '/nonexistent', '--shell', '/usr/sbin/nologin', 'mysql'])
    if (made.code !== 0) throw new StartError(`The account "mysql" could not be made: ${made.output.trim()}`)
  }
}

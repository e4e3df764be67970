/**
 * The command line behind the scripts: `config`, `prepare [--demo]`, `registrar MAIL`, `check`.
 * Bundled into .output/cli so that a start does not have to compile it.
 */
import { ConfigError, readConfig } from '../server/config'
import { commands } from './commands'

const [name = '', ...args] = process.argv.slice(2)

async function main(): Promise<number> {
  const command = commands[name]
  if (!command) throw new ConfigError(`There is no command "${name}"; there are ${Object.keys(commands).join(', ')}.`)
  return await command(readConfig(process.env), args)
}

main().then(
  (code) => { process.exitCode = code },
  (error: unknown) => {
    const known = error instanceof ConfigError
    process.stderr.write(`hartroll: ${known ? error.message : error instanceof Error ? error.stack : String(error)}\n`)
    process.exitCode = 1
  },
)

import { databaseConfig } from '../db/config'
import { connect } from '../db/connection'
import { latest, migrateUp, schemaVersion } from '../db/migrate'
import { seedReference } from '../seeds/reference'
import { systemClock } from '../server/clock'
import { createRegistry } from '../server/composition'
import { ConfigError, type HartrollConfig } from '../server/config'
import { firstRegistrarLink } from '../server/services/people/invite'
import { isDomainError } from '../shared/errors'
import { assertWorkflowsUsable } from '../server/services/workflow/load'
import { checkRegistry } from '../server/services/integrity/check'
import { FileStorage } from '../server/storage/files'

/** @returns exit code */
type Command = (config: HartrollConfig, args: readonly string[]) => Promise<number>

const say = (line: string) => process.stdout.write(`  ${line}\n`)

/** Checks the environment and nothing else: reading it was the check. */
const config: Command = async () => 0

/** Brings the database to this program's schema and reference data; `--demo` fills an empty one of our own. */
const prepare: Command = async (config, args) => {
  const db = connect(databaseConfig(config.databaseUrl, { statementTimeout: 0 }))
  try {
    const before = await schemaVersion(db)
    if (before !== null && before > latest) {
      throw new ConfigError(`The database was made by a newer Hartroll (${before}); this one knows ${latest}. Take the newer program.`)
    }
    if (before !== latest) {
      say(before === null ? 'Making the tables …' : 'Bringing the tables up to date …')
      const names = await migrateUp(db)
      say(`Tables: ${names.length} changes made`)
    }
    await seedReference(db, systemClock.now())
    await assertWorkflowsUsable(db).catch((error: Error) => {
      throw new ConfigError(error.message)
    })
  }
  finally {
    await db.destroy()
  }
  if (args.includes('--demo')) {
    if (!config.ownDatabase) throw new ConfigError('Demo data is never put into a database that Hartroll did not make.')
    const { fillWithDemo } = await import('./demo')
    await fillWithDemo(config, say)
  }
  return 0
}

/** Says every thing in the database that does not agree, a line each; exit code 1 when there is one. */
const check: Command = async (config) => {
  const db = connect(databaseConfig(config.databaseUrl, { statementTimeout: 0, poolMax: 1 }))
  const storage = new FileStorage(config)
  try {
    let findings = 0
    for await (const { code, where, detail } of checkRegistry(db, key => storage.size(key), what => say(`Checking ${what} …`))) {
      findings++
      say(`${code} ${where}${detail ? `: ${detail}` : ''}`)
    }
    say(findings === 0 ? 'Everything agrees' : `${findings} findings`)
    return findings === 0 ? 0 : 1
  }
  finally {
    await db.destroy()
  }
}

/** Prints a one-time link for the first registrar. */
const registrar: Command = async (config, [address]) => {
  if (!address) throw new ConfigError('Say whose: npm run registrar -- MAIL')
  const registry = createRegistry(config)
  try {
    const link = await firstRegistrarLink(registry, address)
    say(`A link for ${address}, good for a day and once:`)
    say(link)
    return 0
  }
  catch (error) {
    if (isDomainError(error) && error.code === 'duplicate') throw new ConfigError('There is a registrar already; they invite everybody else.')
    if (isDomainError(error) && error.code === 'invalid_input') throw new ConfigError(`${address} is not an e-mail address.`)
    throw error
  }
  finally {
    await registry.close()
  }
}

export const commands: Readonly<Record<string, Command>> = { config, prepare, check, registrar }

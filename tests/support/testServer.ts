import { cpSync, existsSync, mkdirSync, mkdtempSync, readdirSync, readFileSync, renameSync, rmSync, statSync } from 'node:fs'
import { createHash } from 'node:crypto'
import os from 'node:os'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { hasMariadb, startMariadb } from '../../scripts/mariadb.mjs'
import { connect } from '../../db/connection'
import { databaseConfig } from '../../db/config'
import { migrateUp } from '../../db/migrate'
import { seedReference } from '../../seeds/reference'

const ROOT = fileURLToPath(new URL('../..', import.meta.url))
/** Migrated data folders by what made them: migrating takes seconds, copying a folder does not. */
const TEMPLATES = path.join(ROOT, '.cache', 'test-databases')
const TEMPLATES_KEPT = 2

/** The day on which the base database was seeded. */
export const SEEDED_AT = new Date('2026-01-05T12:00:00Z')

export interface TestServer {
  readonly url: string
  stop(): Promise<void>
}

/** Starts a private MariaDB in a temporary folder with one database, `base`, migrated and seeded for reference. */
export async function startTestServer(): Promise<TestServer> {
  if (!hasMariadb()) throw new Error('MariaDB\'s server is missing; npm test installs it, or: apt-get install mariadb-server')
  const folder = mkdtempSync(path.join(os.tmpdir(), 'hartroll-test-'))
  try {
    const template = path.join(TEMPLATES, sourcesHash())
    if (!existsSync(template)) await makeTemplate(template)
    copyFolder(template, path.join(folder, 'mariadb'))
    const server = await startMariadb({ folder: path.join(folder, 'mariadb'), password: 'test', database: 'base', forTests: true })
    return {
      url: server.url,
      stop: async () => {
        await server.stop()
        rmSync(folder, { recursive: true, force: true })
      },
    }
  }
  catch (error) {
    rmSync(folder, { recursive: true, force: true })
    throw error
  }
}

async function makeTemplate(template: string): Promise<void> {
  const folder = mkdtempSync(path.join(os.tmpdir(), 'hartroll-test-base-'))
  try {
    const server = await startMariadb({ folder, password: 'test', database: 'base', forTests: true })
    try {
      const db = connect(databaseConfig(server.url, { statementTimeout: 0 }))
      try {
        await migrateUp(db)
        await seedReference(db, SEEDED_AT)
      }
      finally {
        await db.destroy()
      }
    }
    finally {
      await server.stop()
    }
    mkdirSync(TEMPLATES, { recursive: true })
    // Copied under another name first: a run that is cut short must not leave half a template.
    const unfinished = `${template}.${process.pid}`
    copyFolder(folder, unfinished)
    if (existsSync(template)) rmSync(unfinished, { recursive: true, force: true })
    else renameSync(unfinished, template)
    forgetOldTemplates()
  }
  finally {
    rmSync(folder, { recursive: true, force: true })
  }
}

function copyFolder(from: string, to: string): void {
  cpSync(from, to, { recursive: true, preserveTimestamps: true })
}

function forgetOldTemplates(): void {
  const byAge = readdirSync(TEMPLATES)
    .map(name => ({ name, at: statSync(path.join(TEMPLATES, name)).ctimeMs }))
    .sort((a, b) => b.at - a.at)
  for (const { name } of byAge.slice(TEMPLATES_KEPT)) rmSync(path.join(TEMPLATES, name), { recursive: true, force: true })
}

/** Changes whenever a file changes that decides what the base database holds. */
function sourcesHash(): string {
  const hash = createHash('sha256')
  for (const folder of ['db', 'seeds/reference', 'shared/domain', 'scripts/mariadb.mjs', 'seeds/keep.ts']) {
    for (const file of filesIn(path.join(ROOT, folder))) hash.update(path.relative(ROOT, file)).update('\0').update(readFileSync(file))
  }
  return hash.digest('hex').slice(0, 20)
}

function filesIn(target: string): string[] {
  if (!existsSync(target)) return []
  if (statSync(target).isFile()) return [target]
  return readdirSync(target).sort().flatMap(name => filesIn(path.join(target, name)))
}

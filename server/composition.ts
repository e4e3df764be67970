import type { Knex } from 'knex'
import pino, { type Logger } from 'pino'
import { openDatabase } from '../db/connection'
import { readConfig, type HartrollConfig } from './config'
import { systemClock, type Clock } from './clock'
import { openPayments, type Payments } from './payments/provider'
import { FileStorage } from './storage/files'
import { openScanner, type Scanner } from './storage/scanner'
import { settingsReader, type Settings } from './services/settings/read'

/** What one registry (one database, one society) works with. Nothing of it lives at module level. */
export interface Registry {
  readonly config: HartrollConfig
  readonly db: Knex
  readonly clock: Clock
  readonly log: Logger
  /** Null where no payments service is set up: then fees are booked by the office. */
  readonly payments: Payments | null
  readonly storage: FileStorage
  /** Null where uploads are not scanned. */
  readonly scanner: Scanner | null
  /** The society's own values (name, zone, currency …), read from the database, at most a few seconds old. */
  settings(): Promise<Settings>
  close(): Promise<void>
}

export interface CompositionOptions {
  readonly clock?: Clock
  readonly log?: Logger
  readonly poolSize?: number
}

/** Wires configuration to the parts. Routes, the worker, scripts and tests all begin here. Opens no connection by itself. */
export function createRegistry(config: HartrollConfig, options: CompositionOptions = {}): Registry {
  const db = openDatabase(config.databaseUrl, { poolSize: options.poolSize })
  const log = options.log ?? pino({ level: process.env.HARTROLL_LOG_LEVEL ?? 'info', base: undefined })
  return {
    config,
    db,
    clock: options.clock ?? systemClock,
    log,
    payments: openPayments(config),
    storage: new FileStorage(config),
    scanner: openScanner(config.scannerUrl),
    settings: settingsReader(db),
    close: () => db.destroy(),
  }
}

/** The registry of the environment, as the two processes and the scripts start it. */
export function registryFromEnvironment(options: CompositionOptions = {}): Registry {
  return createRegistry(readConfig(process.env), options)
}

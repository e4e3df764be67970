import knex, { type Knex } from 'knex'
import mysql2, { type ConnectionOptions } from 'mysql2'
import { databaseConfig, type DatabaseConfig } from './config'
import type {} from './tables'

/** How much longer than the server the client waits before it takes the connection for dead. */
const GRACE = 2_000

interface DriverConnection {
  query: (sql: string, done: (error: Error | null) => void) => void
  destroy: () => void
  __knex__disposed?: unknown
}

interface DriverQuery {
  sql: string
  options?: { timeout?: number }
}

/** The dialect's class, as far as it is overridden here; Knex publishes no types for it. */
// eslint-disable-next-line @typescript-eslint/no-unused-vars -- it is declared to be a type, since there is no value of it here
declare class Dialect extends knex.Client {
  _driver(): unknown
  _query(connection: DriverConnection, query: DriverQuery): Promise<unknown>
}
const MySql2Dialect = knex({ client: 'mysql2' }).client.constructor as typeof Dialect

/** The mysql2 dialect, with a limit on how long one statement may leave its socket silent; 0 is none. */
function dialectWithTimeout(timeout: number): typeof knex.Client {
  return class extends MySql2Dialect {
    override _driver() {
      return mysql2
    }

    override async _query(connection: DriverConnection, query: DriverQuery) {
      query.options = { ...(timeout > 0 ? { timeout } : {}), ...query.options }
      try {
        return await super._query(connection, query)
      }
      catch (error) {
        // The answer may still come: nobody else must read it as theirs.
        if ((error as { code?: string }).code === 'PROTOCOL_SEQUENCE_TIMEOUT') {
          connection.__knex__disposed = error
          connection.destroy()
        }
        throw error
      }
    }
  }
}

/** Statements that make every session alike, whatever the server's own settings are. */
function sessionSettings(config: DatabaseConfig): string {
  return `SET SESSION ${[
    'sql_mode = \'STRICT_ALL_TABLES,NO_ZERO_DATE,NO_ZERO_IN_DATE,ERROR_FOR_DIVISION_BY_ZERO,NO_ENGINE_SUBSTITUTION\'',
    'time_zone = \'+00:00\'',
    'character_set_client = utf8mb4',
    'character_set_results = utf8mb4',
    'collation_connection = utf8mb4_uca1400_nopad_ai_ci',
    'tx_isolation = \'READ-COMMITTED\'',
    'group_concat_max_len = 1048576',
    `innodb_lock_wait_timeout = ${Math.max(1, Math.ceil(config.lockTimeout / 1000))}`,
    `max_statement_time = ${config.statementTimeout / 1000}`,
  ].join(', ')}`
}

/** Options for Knex; shared with the migrations' command line. */
export function knexConfig(config: DatabaseConfig): Knex.Config {
  const driver: ConnectionOptions = {
    ...(config.socketPath ? { socketPath: config.socketPath } : { host: config.host, port: config.port }),
    user: config.user,
    password: config.password,
    database: config.database,
    timezone: 'Z',
    dateStrings: true,
    jsonStrings: true,
    supportBigNumbers: true,
    decimalNumbers: true,
    stringifyObjects: true,
    connectTimeout: config.connectTimeout,
  }
  return {
    client: dialectWithTimeout(config.statementTimeout > 0 ? config.statementTimeout + GRACE : 0),
    connection: driver as Knex.MySql2ConnectionConfig,
    pool: {
      min: config.poolMin,
      max: config.poolMax,
      // A refused connection is told at once instead of being tried again until the acquire time-out.
      propagateCreateError: true,
      createTimeoutMillis: config.connectTimeout + GRACE,
      afterCreate: (connection: DriverConnection, done: (error: Error | null, connection: DriverConnection) => void) => {
        connection.query(sessionSettings(config), error => done(error, connection))
      },
    } satisfies Knex.PoolConfig,
    acquireConnectionTimeout: config.acquireTimeout,
    log: {
      // What cannot be acquired is thrown to the caller; a second telling from the pool would be noise.
      warn: (message: unknown) => {
        if (!String(message).startsWith('Acquire connection error')) console.warn(message)
      },
    },
  }
}

/**
 * Opens a pool; nothing is sent until the first statement. The caller ends it with `destroy()`.
 * BIGINT arrives as a number while it is one that a number can hold, DATETIME and DATE as strings, JSON as text.
 */
export function connect(config: DatabaseConfig): Knex {
  return knex(knexConfig(config))
}

/** Opens a pool on an address such as DATABASE_URL. Throws an Error with one clear line for one that is none. */
export function openDatabase(url: string, options: { poolSize?: number } = {}): Knex {
  return connect(databaseConfig(url, options.poolSize ? { poolMax: options.poolSize } : {}))
}

import { setTimeout as pause } from 'node:timers/promises'
import type { Knex } from 'knex'
import { isLockConflict, translateDatabaseError } from './errors'

const ATTEMPTS = 5
const FIRST_PAUSE = 15

/**
 * Runs `work` in one transaction and repeats the whole of it when the database gave up on it for a deadlock or a
 * lock that did not come, up to five times. So `work` must call nothing outside the database, and keep nothing
 * from an attempt that failed. Inside another transaction it joins that one.
 *
 * Throws what `work` throws, driver errors translated (`translateDatabaseError`).
 */
export async function inTransaction<T>(db: Knex, work: (trx: Knex.Transaction) => Promise<T>): Promise<T> {
  if (db.isTransaction) return work(db as Knex.Transaction)
  for (let attempt = 1; ; attempt++) {
    try {
      return await db.transaction(work)
    }
    catch (error) {
      if (!isLockConflict(error) || attempt === ATTEMPTS) throw translateDatabaseError(error)
      // Two that stopped each other must not meet again at the same moment.
      await pause(FIRST_PAUSE * 2 ** attempt * (0.5 + Math.random()))
    }
  }
}

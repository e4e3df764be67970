import type { Knex } from 'knex'
import type { EntriesRow } from '../../../db/tables'
import type { Day } from '../../../shared/domain/dates'
import { findFee, sumLedger } from '../../repositories/catalogue'

/** What an entry owes and has paid, in integer minor units of `currency`. */
export interface FeeStanding {
  readonly version: number | null
  readonly currency: string | null
  readonly due: number
  /** paid less what went back */
  readonly settled: number
  readonly waived: boolean
  /** what is still to be paid; 0 where the fee is waived */
  readonly open: number
}

/** The fee by the version pinned at the first checkout, before that by the one in force today. */
export async function feeStanding(db: Knex, entry: Pick<EntriesRow, 'id' | 'class_id' | 'fee_version'>, today: Day): Promise<FeeStanding> {
  const fee = await findFee(db, entry.class_id, entry.fee_version === null ? { day: today } : { version: entry.fee_version })
  const { settled, waived } = await sumLedger(db, entry.id, fee?.currency ?? null)
  const due = fee?.amount_minor ?? 0
  return { version: fee?.version ?? null, currency: fee?.currency ?? null, due, settled, waived, open: waived ? 0 : Math.max(0, due - settled) }
}

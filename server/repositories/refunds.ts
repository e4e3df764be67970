import type { Knex } from 'knex'

export interface RefundCommand {
  readonly entry_id: number
  readonly idempotency_key: string
  readonly payload: string
  readonly run_at: string
  readonly created_at: string
}

/** Leaves a refund for the worker, in the transaction of the withdrawal. Asked twice it is still one. */
export async function insertRefundCommand(trx: Knex, row: RefundCommand): Promise<void> {
  const standing = await trx('payment_commands').where({ idempotency_key: row.idempotency_key }).first('id')
  if (!standing) await trx('payment_commands').insert({ kind: 'refund', ...row })
}

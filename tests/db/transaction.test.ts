import { beforeAll, describe, expect, it } from 'vitest'
import type { Knex } from 'knex'
import { inTransaction } from '../../db/transaction'
import { databaseConfig } from '../../db/config'
import { connect } from '../../db/connection'
import { isDomainError } from '../../shared/errors'
import { useDatabase } from '../support/database'
import { whereIs } from './fixtures'

const own = useDatabase()
let db: Knex
beforeAll(() => {
  db = own.db
})

const counters = async () => {
  const [a, b] = [`a-${Math.random()}`, `b-${Math.random()}`]
  await db('counters').insert([{ name: a, value: 0 }, { name: b, value: 0 }])
  return [a, b] as const
}
const add = (trx: Knex.Transaction, name: string) => trx('counters').where({ name }).increment('value', 1)
const valueOf = async (name: string) => (await db('counters').where({ name }).first('value'))!.value

describe('inTransaction', () => {
  it('repeats the whole after a real deadlock, so that both transactions end and nothing is counted twice', async () => {
    const [a, b] = await counters()
    let attempts = 0
    let met = 0
    let meet!: () => void
    const bothHoldOne = new Promise<void>((resolve) => {
      meet = resolve
    })
    const crosswise = (first: string, second: string) => inTransaction(db, async (trx) => {
      attempts++
      await add(trx, first)
      if (++met === 2) meet()
      await bothHoldOne
      await add(trx, second)
    })
    await Promise.all([crosswise(a, b), crosswise(b, a)])
    expect(attempts).toBe(3)
    expect([await valueOf(a), await valueOf(b)]).toEqual([2, 2])
  })

  it('gives up after five attempts with a refusal that says the database is away', async () => {
    let attempts = 0
    const failing = inTransaction(db, async () => {
      attempts++
      throw Object.assign(new Error('Deadlock found'), { errno: 1213, code: 'ER_LOCK_DEADLOCK' })
    })
    await expect(failing).rejects.toMatchObject({ code: 'database_away', status: 503 })
    expect(attempts).toBe(5)
  })

  it('undoes everything when the work throws, and throws what it threw', async () => {
    const [a] = await counters()
    const boom = new Error('boom')
    await expect(inTransaction(db, async (trx) => {
      await add(trx, a)
      throw boom
    })).rejects.toBe(boom)
    expect(await valueOf(a)).toBe(0)
  })

  it('joins the transaction it is called in', async () => {
    const [a] = await counters()
    await expect(inTransaction(db, async (outer) => {
      await inTransaction(outer, inner => add(inner, a))
      throw new Error('undo')
    })).rejects.toThrow('undo')
    expect(await valueOf(a)).toBe(0)
  })

  it('does not wait for a lock longer than it was told', async () => {
    const [a] = await counters()
    const config = databaseConfig('mysql://none/none')
    const hasty = connect({ ...config, ...(await whereIs(db)), lockTimeout: 1000 })
    try {
      await db.transaction(async (holder) => {
        await add(holder, a)
        const began = Date.now()
        const error: unknown = await hasty('counters').where({ name: a }).update({ value: 9 }).then(() => null, (caught: unknown) => caught)
        expect((error as { errno: number }).errno).toBe(1205)
        expect(Date.now() - began).toBeLessThan(3_000)
      })
    }
    finally {
      await hasty.destroy()
    }
  })

  it('reads what others have committed while it ran', async () => {
    const [a] = await counters()
    await inTransaction(db, async (trx) => {
      await trx('counters').where({ name: a }).first()
      await add(db as Knex.Transaction, a)
      expect((await trx('counters').where({ name: a }).first('value'))!.value).toBe(1)
    })
  })
})

it('isDomainError knows what inTransaction throws', async () => {
  const error: unknown = await inTransaction(db, trx => trx('counters').insert([{ name: 'twice' }, { name: 'twice' }])).catch((caught: unknown) => caught)
  expect(isDomainError(error)).toBe(true)
  expect(error).toMatchObject({ code: 'duplicate', status: 409 })
})

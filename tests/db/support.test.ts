import { describe, expect, test } from 'vitest'
import { takeDatabase, useDatabase } from '../support/database'

const mine = useDatabase()

describe('a database for the tests of one file', () => {
  test('holds the tables and the reference rows of the base', async () => {
    const [{ n }] = await mine.db('species').count({ n: '*' }) as [{ n: number }]
    expect(n).toBeGreaterThan(5)
  })

  test('is nobody else\'s while the file runs', async () => {
    const other = await takeDatabase()
    expect(other.name).not.toBe(mine.name)
    await other.db('settings').insert({ name: 'left_behind', value: '1', seeded_value: '1' })
    await other.db('species').update({ sort: 77 })
    await other.release()

    // Files that run beside this one take and release too: others are held until the same one comes round again.
    const others: Awaited<ReturnType<typeof takeDatabase>>[] = []
    let again = await takeDatabase()
    while (again.name !== other.name && others.length < 6) {
      others.push(again)
      again = await takeDatabase()
    }
    // Where another file was quicker, that file has it, and finds it clean or fails of itself.
    if (again.name === other.name) {
      expect(await again.db('settings').where({ name: 'left_behind' })).toEqual([])
      expect(await again.db('species').where({ sort: 77 })).toEqual([])
    }
    for (const held of [again, ...others]) await held.release()
  })

  test('refuses what the schema refuses: its triggers and keys came along', async () => {
    const triggers = await mine.db.raw('SHOW TRIGGERS') as [unknown[]]
    expect(triggers[0].length).toBeGreaterThan(0)
    await expect(mine.db('classes').insert({ code: 'x', species_id: 999_999, definition: 'x@1', step: '1/8', typicality: 'single', offered: 0, sort: 1 })).rejects.toThrow()
  })
})

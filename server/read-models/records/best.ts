import type { Knex } from 'knex'

/** Number of the first record of each class's list. */
export async function bestOfClasses(db: Knex): Promise<Map<number, number>> {
  const classes: { id: number }[] = await db('classes').where('offered', 1).select('id')
  const firsts = await Promise.all(classes.map(async ({ id }) => {
    const row = await db('records').where('class_id', id).whereIn('status', ['accepted', 'challenged'])
      .orderBy([{ column: 'net16', order: 'desc' }, { column: 'taken_first_on' }, { column: 'id' }]).first('record_no')
    return [id, row?.record_no] as const
  }))
  return new Map(firsts.filter((pair): pair is readonly [number, number] => pair[1] !== undefined))
}

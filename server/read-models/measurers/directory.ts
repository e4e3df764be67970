import type { Knex } from 'knex'
import { sqlTime } from '../../../db/time'

export interface MeasurerRow {
  readonly uid: string
  readonly name: string
  readonly number: string
  readonly district_id: number | null
  readonly valid_to: string
  /** Ids of the species that the accreditation names. */
  readonly species: readonly number[]
}

/** Measurers who are accredited on a day and hold the role at an instant, by name. Neither address nor contact is read. */
export async function accreditedMeasurers(db: Knex, today: string, now: Date): Promise<MeasurerRow[]> {
  const at = sqlTime(now)
  const rows = await db('accreditations as a').join('users as u', 'u.id', 'a.user_id')
    .where('a.valid_from', '<=', today).where('a.valid_to', '>=', today).whereNull('a.suspended_at')
    .whereNull('u.disabled_at').whereNull('u.erased_at')
    .whereExists(role => role.from('user_roles as r').select(db.raw('1')).whereRaw('r.user_id = u.id').where('r.role', 'measurer')
      .where('r.from_at', '<=', at).where(open => open.whereNull('r.to_at').orWhere('r.to_at', '>', at)))
    .orderBy([{ column: 'u.name' }, { column: 'a.id' }])
    .select('a.id', 'u.uid', 'u.name', 'a.number', 'u.district_id', 'a.valid_to')
  const species = rows.length === 0 ? [] : await db('accreditation_species').whereIn('accreditation_id', rows.map(row => row.id)).select('accreditation_id', 'species_id')
  return rows.map(({ id, ...row }) => ({ ...row, species: species.filter(one => one.accreditation_id === id).map(one => one.species_id) }))
}

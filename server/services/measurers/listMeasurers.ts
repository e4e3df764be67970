import { DomainError, type FieldError } from '../../../shared/errors'
import type { MeasurersAnswer, MeasurersQuery } from '../../../shared/schemas/measurers'
import { dayIn } from '../../clock'
import type { Registry } from '../../composition'
import { classesInForce } from '../../read-models/classStandings'
import { accreditedMeasurers } from '../../read-models/measurers/directory'
import { readNames } from '../../read-models/records/names'

/**
 * The public directory of official measurers by district and species.
 *
 * @throws DomainError `invalid_input` with the field whose code nobody knows
 */
export async function listMeasurers(registry: Registry, query: MeasurersQuery): Promise<MeasurersAnswer> {
  const { db, clock } = registry
  const { timeZone, officeEmail } = await registry.settings()
  const today = dayIn(timeZone, clock.now())
  const [rows, names, inForce] = await Promise.all([accreditedMeasurers(db, today, clock.now()), readNames(db), classesInForce(db, today)])
  const speciesOf = new Map([...names.classes.values()].map(one => [one.speciesId, one.species]))
  const order = [...speciesOf.values()]
  const fields: FieldError[] = []
  if (query.species && !order.includes(query.species)) fields.push({ path: 'species', code: 'unknown_code' })
  if (query.district && ![...names.districts.values()].some(one => one.code === query.district)) fields.push({ path: 'district', code: 'unknown_code' })
  if (fields.length > 0) throw new DomainError('invalid_input', { fields })

  const items = rows.map((row) => {
    const district = row.district_id === null ? undefined : names.districts.get(row.district_id)
    return {
      id: row.uid, name: row.name, number: row.number, district: district ? { code: district.code, name: district.name } : null,
      species: row.species.map(id => speciesOf.get(id)).filter(code => code !== undefined).sort((a, b) => order.indexOf(a) - order.indexOf(b)), validTo: row.valid_to,
    }
  })
  return {
    items: items.filter(one => (!query.species || one.species.includes(query.species)) && (!query.district || one.district?.code === query.district)),
    species: order.filter(code => inForce.some(one => one.offered && one.species === code)),
    districts: [...names.districts.values()].map(({ code, name }) => ({ code, name })),
    officeEmail,
  }
}

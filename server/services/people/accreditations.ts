import type { Knex } from 'knex'
import { inTransaction } from '../../../db/transaction'
import { sqlTime } from '../../../db/time'
import type { ActiveActor } from '../../../shared/domain/access/roles'
import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { insertAccreditation, lockAccreditation, replaceSpecies, speciesByCode, updateAccreditation } from '../../repositories/accreditations'
import { isOpen, lockById, lockByUid } from '../../repositories/users'
import { newUid } from '../moment'

export interface AccreditationInput {
  /** first and last day, `YYYY-MM-DD`, both counted */
  readonly validFrom: string
  readonly validTo: string
  /** codes of the species that may be measured */
  readonly species: readonly string[]
}

async function speciesIds(trx: Knex, codes: readonly string[]): Promise<number[]> {
  const wanted = [...new Set(codes)]
  const found = await speciesByCode(trx, wanted)
  if (found.length !== wanted.length) throw new DomainError('invalid_input', { fields: [{ path: 'species', code: 'invalid' }] })
  return found.map(one => one.id)
}

/**
 * A registrar accredits a measurer.
 *
 * @returns id of the accreditation
 * @throws DomainError `forbidden` for oneself, `duplicate` (field `number`), `invalid_input`, `not_found`
 */
export async function accredit(registry: Registry, actor: ActiveActor, userUid: string, input: AccreditationInput & { readonly number: string }): Promise<{ id: string }> {
  if (userUid === actor.uid) throw new DomainError('forbidden', { details: { reason: 'own_roles' } })
  const now = registry.clock.now()
  return inTransaction(registry.db, async (trx) => {
    const target = await lockByUid(trx, userUid)
    if (!target || !isOpen(target)) throw new DomainError('not_found')
    const uid = newUid(now)
    const id = await insertAccreditation(trx, { uid, user_id: target.id, number: input.number, valid_from: input.validFrom, valid_to: input.validTo, created_at: sqlTime(now) })
    await replaceSpecies(trx, id, await speciesIds(trx, input.species))
    return { id: uid }
  })
}

/** Renews, narrows, suspends or restores an accreditation; its number stays. Throws as `accredit`. */
export async function changeAccreditation(registry: Registry, actor: ActiveActor, uid: string, input: AccreditationInput & { readonly suspended: boolean }): Promise<void> {
  const now = registry.clock.now()
  await inTransaction(registry.db, async (trx) => {
    const row = await lockAccreditation(trx, uid)
    const target = row && await lockById(trx, row.user_id)
    if (!row || !target) throw new DomainError('not_found')
    if (target.id === actor.userId) throw new DomainError('forbidden', { details: { reason: 'own_roles' } })
    await updateAccreditation(trx, row.id, {
      valid_from: input.validFrom, valid_to: input.validTo, suspended_at: input.suspended ? row.suspended_at ?? sqlTime(now) : null,
    })
    await replaceSpecies(trx, row.id, await speciesIds(trx, input.species))
  })
}

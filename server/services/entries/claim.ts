import { inTransaction } from '../../../db/transaction'
import type { ActiveActor } from '../../../shared/domain/access/roles'
import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { lockClaim, spendClaim } from '../../repositories/claims'
import { lockEntry, updateEntry } from '../../repositories/entries'
import { listPeople, updatePerson } from '../../repositories/entryPeople'
import { nameKey } from '../../../shared/domain/fold'
import { appendEvent } from '../events/append'
import { momentOf } from '../moment'
import { tokenHash } from '../notices/mint'
import { takeTry } from '../people/limits'
import { normalClaimCode } from './claimCode'

/**
 * Makes an entry that somebody began for a person that person's own, by the code that they were given. Returns its uid.
 *
 * @throws DomainError `link_spent` for a code that was used, has run out or never was, `too_many_requests`
 */
export async function claimEntry(registry: Registry, actor: ActiveActor, typed: string): Promise<string> {
  await takeTry(registry, [{ key: `claim:user:${actor.userId}`, free: 10, window: 3600, longest: 900 }])
  const moment = await momentOf(registry)
  return inTransaction(registry.db, async (trx) => {
    const claim = await lockClaim(trx, tokenHash(normalClaimCode(typed)), moment.at)
    const { entry: uid } = JSON.parse(claim?.payload ?? '{}') as { entry?: string }
    const entry = claim && uid ? await lockEntry(trx, uid) : undefined
    if (!claim || !entry || entry.owner_user_id !== null) throw new DomainError('link_spent', { fields: [{ path: 'code', code: 'link_spent' }] })
    await spendClaim(trx, claim.id, moment.at)
    await updateEntry(trx, entry.id, { owner_user_id: actor.userId })
    // The person of the same name in the entry is the one who claims it.
    const mine = nameKey(actor.name)
    for (const person of await listPeople(trx, entry.id)) {
      if (person.user_id === null && person.name_key === mine) await updatePerson(trx, person.id, { user_id: actor.userId })
    }
    await appendEvent(trx, entry, { kind: 'claim', from: entry.state, to: entry.state, actor }, moment)
    return entry.uid
  })
}

import { inTransaction } from '../../../db/transaction'
import { canReport, isOwner } from '../../../shared/domain/access/abilities'
import { hasRole, type ActiveActor } from '../../../shared/domain/access/roles'
import { nameKey } from '../../../shared/domain/fold'
import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { lockEntry, updateEntry } from '../../repositories/entries'
import { findChallenge, insertChallenge, listChallenges, updateChallenge } from '../../repositories/panel'
import { findRecordByNo } from '../../repositories/records'
import { accessOf } from '../entries/access'
import { loadContext } from '../entries/context'
import { assertNoStake, withEntry } from '../entries/locked'
import { appendEvent } from '../events/append'
import { momentOf, newUid } from '../moment'

/**
 * Anybody's signed report on a listed record. The reporter's name stays with the office.
 *
 * @param signature the reporter's own name, written out
 * @returns uid of the report
 * @throws DomainError `not_found`, `forbidden` (one's own record), `invalid_input`
 */
export async function reportRecord(registry: Registry, actor: ActiveActor, recordNo: number, report: { text: string, signature: string }): Promise<string> {
  const moment = await momentOf(registry)
  const record = await findRecordByNo(registry.db, recordNo)
  if (!record) throw new DomainError('not_found')
  if (nameKey(report.signature) !== nameKey(actor.name)) throw new DomainError('invalid_input', { fields: [{ path: 'signature', code: 'not_your_name' }] })
  return inTransaction(registry.db, async (trx) => {
    const entry = (await lockEntry(trx, record.entry_uid))!
    const access = await accessOf(trx, entry)
    if (!canReport(actor, access)) throw new DomainError(isOwner(actor, access) ? 'forbidden' : 'wrong_state')
    const open = (await listChallenges(trx, entry.id)).some(one => one.reporter_user_id === actor.userId && one.state === 'reported')
    if (open) throw new DomainError('duplicate')
    const uid = newUid(moment.now)
    await insertChallenge(trx, { uid, entry_id: entry.id, reporter_user_id: actor.userId, reporter_name: actor.name, text: report.text.trim(), reported_at: moment.at })
    return uid
  })
}

/** The office says whether a report is worth the chair's time. Whoever has a stake in the animal does not. */
export async function checkReport(registry: Registry, actor: ActiveActor, uid: string, holds: boolean): Promise<void> {
  if (!hasRole(actor, 'reviewer')) throw new DomainError('forbidden')
  const found = await findChallenge(registry.db, uid)
  if (!found) throw new DomainError('not_found')
  const moment = await momentOf(registry)
  await inTransaction(registry.db, async (trx) => {
    const entry = (await lockEntry(trx, found.entry_uid))!
    const report = (await findChallenge(trx, uid))!
    if (report.state !== 'reported') throw new DomainError('wrong_state', { details: { state: report.state } })
    await assertNoStake(trx, await loadContext(trx, entry), actor, 'challenge')
    await updateChallenge(trx, report.id, { state: holds ? 'checked' : 'dismissed', checked_by: actor.userId, checked_at: moment.at })
  })
}

/** The entrant's answer to a challenge, within the days that are given for it. */
export function answerChallenge(registry: Registry, actor: ActiveActor, entryUid: string, text: string): Promise<void> {
  return withEntry(registry, actor, entryUid, async ({ trx, entry, access, moment }) => {
    if (!isOwner(actor, access)) throw new DomainError('forbidden')
    const running = (await listChallenges(trx, entry.id)).find(one => one.state === 'taken_up')
    if (!running || running.answered_at !== null) throw new DomainError('wrong_state', { details: { state: entry.state } })
    await updateChallenge(trx, running.id, { answer_text: text.trim(), answered_at: moment.at })
    await appendEvent(trx, entry, { kind: 'answer_challenge', actor, args: { challenge: running.uid }, texts: { text } }, moment)
    await updateEntry(trx, entry.id, {})
  })
}

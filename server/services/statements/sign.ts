import { createHash } from 'node:crypto'
import { isoTime } from '../../../db/time'
import { inTransaction } from '../../../db/transaction'
import type { ActiveActor } from '../../../shared/domain/access/roles'
import { canReadEntry, isOwner } from '../../../shared/domain/access/abilities'
import { nameKey } from '../../../shared/domain/fold'
import { statementSigners, type SignerPart } from '../../../shared/domain/workflow/origins'
import { hasOpenFacts } from '../../../shared/domain/workflow/states'
import { DomainError } from '../../../shared/errors'
import type { Part } from '../../../shared/domain/access/stakes'
import type { Registry } from '../../composition'
import { lockEntry, updateEntry } from '../../repositories/entries'
import { listPeople } from '../../repositories/entryPeople'
import { findStatementText, insertStatement, listStatements, voidStatementBy } from '../../repositories/statements'
import { accessOf } from '../entries/access'
import { readableEntry } from '../entries/sees'
import { appendEvent } from '../events/append'
import { momentOf, newUid } from '../moment'

export interface StatementShown {
  readonly text: { readonly version: number, readonly body: string }
  /** who may sign, as the origin and the people of the entry have it */
  readonly signers: readonly { readonly part: SignerPart, readonly name: string }[]
  readonly signed: readonly { readonly part: string, readonly name: string, readonly textVersion: number, readonly signedAt: string, readonly stands: boolean }[]
  readonly maySign: boolean
}

async function signersOf(db: Parameters<typeof listPeople>[0], entryId: number, origin: Parameters<typeof statementSigners>[0]['origin']) {
  const people = await listPeople(db, entryId)
  const parts = statementSigners({ origin, people: people.map(person => ({ part: person.part as Part, minor: person.is_minor === 1, died: person.died_on !== null })) })
  return parts.flatMap(part => people.filter(person => person.part === part).map(person => ({ part, name: person.name })))
}

/** The statement in its newest words, who has to sign it, and who has. */
export async function readStatement(registry: Registry, actor: ActiveActor, uid: string, locale: string): Promise<StatementShown> {
  const { db } = registry
  const { entry, access } = await readableEntry(db, actor, uid)
  const [text, signers, signed] = await Promise.all([findStatementText(db, locale), signersOf(db, entry.id, entry.origin), listStatements(db, entry.id)])
  if (!text) throw new DomainError('not_configured')
  return {
    text: { version: text.version, body: text.body },
    signers,
    signed: signed.map(one => ({ part: one.part, name: one.signer_name, textVersion: one.text_version, signedAt: isoTime(one.signed_at), stands: one.voided_at === null })),
    maySign: isOwner(actor, access) && (hasOpenFacts(entry.state) || entry.state === 'returned'),
  }
}

/**
 * Signs the statement by the typed name of whoever has to: hunter, finder or owner, the guardian of a minor, the heir of a
 * hunter who has died. The name has to be that person's; the words that were read are named by their version.
 *
 * @throws DomainError `not_found`, `forbidden`, `wrong_state`, `invalid_input` (fields `part`, `name`, `textVersion`)
 */
export async function signStatement(registry: Registry, actor: ActiveActor, uid: string, input: { readonly part: SignerPart, readonly name: string, readonly textVersion: number }, locale: string): Promise<void> {
  const moment = await momentOf(registry)
  const text = await findStatementText(registry.db, locale)
  if (!text) throw new DomainError('not_configured')
  if (text.version !== input.textVersion) throw new DomainError('invalid_input', { fields: [{ path: 'textVersion', code: 'statement_changed' }] })
  await inTransaction(registry.db, async (trx) => {
    const entry = await lockEntry(trx, uid)
    const access = entry && await accessOf(trx, entry)
    if (!entry || !access || !canReadEntry(actor, access)) throw new DomainError('not_found')
    if (!isOwner(actor, access)) throw new DomainError('forbidden')
    if (!hasOpenFacts(entry.state) && entry.state !== 'returned') throw new DomainError('wrong_state', { details: { state: entry.state } })
    const signer = (await signersOf(trx, entry.id, entry.origin)).find(one => one.part === input.part)
    if (!signer) throw new DomainError('invalid_input', { fields: [{ path: 'part', code: 'no_signer' }] })
    if (nameKey(signer.name) !== nameKey(input.name)) throw new DomainError('invalid_input', { fields: [{ path: 'name', code: 'other_name', params: { name: signer.name } }] })
    await voidStatementBy(trx, entry.id, input.part, moment.at)
    await insertStatement(trx, {
      uid: newUid(moment.now), entry_id: entry.id, text_version: text.version, locale: text.locale, part: input.part, signer_name: input.name.trim(),
      user_id: actor.userId, body_hash: createHash('sha256').update(text.body).digest('hex'), signed_at: moment.at,
    })
    await updateEntry(trx, entry.id, {})
    await appendEvent(trx, entry, { kind: 'statement_signed', actor, args: { part: input.part, textVersion: text.version }, texts: { name: input.name.trim() } }, moment)
  })
}

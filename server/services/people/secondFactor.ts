import { randomInt } from 'node:crypto'
import { inTransaction } from '../../../db/transaction'
import { sqlTime } from '../../../db/time'
import type { Knex } from 'knex'
import type { ActiveActor } from '../../../shared/domain/access/roles'
import { DomainError } from '../../../shared/errors'
import type { Registry } from '../../composition'
import { endSessions, markSecondFactor } from '../../repositories/sessions'
import { findById, lockById, replaceRecoveryCodes, updateUser } from '../../repositories/users'
import { queueNotice } from '../notices/queue'
import { forgiveTry, takeTry, type Limit } from './limits'
import { plainCode, recoveryHash, takeTotpCode } from './secondFactorCode'
import { seal } from './secrets'
import { newTotpSecret, totpUri } from './totp'
import { verifyPassword, type PasswordProof } from './verifyPassword'

const CODES = 10
const CODE_LENGTH = 10
/** Without letters and figures that are taken for each other. */
const ALPHABET = 'ABCDEFGHJKMNPQRSTVWXYZ23456789'

type Proof = { readonly password: string } & PasswordProof

function newRecoveryCodes(): string[] {
  return Array.from({ length: CODES }, () => {
    const code = Array.from({ length: CODE_LENGTH }, () => ALPHABET[randomInt(ALPHABET.length)]).join('')
    return `${code.slice(0, 5)}-${code.slice(5)}`
  })
}

async function giveRecoveryCodes(registry: Registry, trx: Knex, actor: ActiveActor, now: Date): Promise<string[]> {
  const codes = newRecoveryCodes()
  await replaceRecoveryCodes(trx, actor.userId, codes.map(code => recoveryHash(registry, actor.uid, code)), now)
  return codes
}

const tell = (trx: Knex, actor: ActiveActor, now: Date) =>
  queueNotice(trx, now, { template: 'second_factor_changed', toEmail: actor.email, userId: actor.userId, args: { name: actor.name } })

/**
 * Begins to set up an authenticator: a new secret that counts once a code of it was entered.
 *
 * @returns the secret in base 32 and the address for the QR code; both are shown this once
 * @throws DomainError as `verifyPassword`; `duplicate` when there is one already
 */
export async function beginSecondFactor(registry: Registry, actor: ActiveActor, proof: Proof): Promise<{ secret: string, uri: string }> {
  await verifyPassword(registry, actor, proof.password, proof)
  const { societyName } = await registry.settings()
  const secret = newTotpSecret()
  await inTransaction(registry.db, async (trx) => {
    const account = await lockById(trx, actor.userId)
    if (account!.totp_enabled_at !== null) throw new DomainError('duplicate')
    await updateUser(trx, actor.userId, { totp_secret_enc: seal(registry.config.secret, 'totp', actor.uid, secret), totp_last_step: null })
  })
  return { secret, uri: totpUri(secret, actor.email, societyName) }
}

/**
 * Ends setting up: a code of the new authenticator was entered. Other sessions end, this one has passed.
 *
 * @returns recovery codes, shown this once
 * @throws DomainError `second_factor_required` (field `code`), `wrong_state` when nothing was begun, `too_many_requests`
 */
export async function enableSecondFactor(registry: Registry, actor: ActiveActor, code: string): Promise<{ recoveryCodes: string[] }> {
  const limit: Limit = { key: `enable:session:${actor.sessionId}`, free: 10, window: 3600, longest: 300 }
  await takeTry(registry, [limit])
  const now = registry.clock.now()
  const recoveryCodes = await inTransaction(registry.db, async (trx) => {
    const account = await lockById(trx, actor.userId)
    if (!account?.totp_secret_enc || account.totp_enabled_at !== null) throw new DomainError('wrong_state')
    if (!/^\d{6}$/.test(plainCode(code)) || !await takeTotpCode(registry, trx, account, code)) {
      throw new DomainError('second_factor_required', { details: { reason: 'wrong' }, fields: [{ path: 'code', code: 'second_factor_wrong' }] })
    }
    await updateUser(trx, actor.userId, { totp_enabled_at: sqlTime(now) })
    await endSessions(trx, actor.userId, now, actor.sessionId)
    await markSecondFactor(trx, actor.sessionId, now)
    await tell(trx, actor, now)
    return giveRecoveryCodes(registry, trx, actor, now)
  })
  await forgiveTry(registry, [limit])
  return { recoveryCodes }
}

/** Takes the second factor off. @throws DomainError as `verifyPassword`; `wrong_state` when there is none */
export async function removeSecondFactor(registry: Registry, actor: ActiveActor, proof: Proof): Promise<void> {
  await verifyPassword(registry, actor, proof.password, proof)
  const now = registry.clock.now()
  await inTransaction(registry.db, async (trx) => {
    const account = await lockById(trx, actor.userId)
    if (account!.totp_enabled_at === null) throw new DomainError('wrong_state')
    await updateUser(trx, actor.userId, { totp_enabled_at: null, totp_secret_enc: null, totp_last_step: null })
    await replaceRecoveryCodes(trx, actor.userId, [], now)
    await markSecondFactor(trx, actor.sessionId, null)
    await tell(trx, actor, now)
  })
}

/** New recovery codes; the old ones are worth nothing from now on. @throws as `removeSecondFactor` */
export async function renewRecoveryCodes(registry: Registry, actor: ActiveActor, proof: Proof): Promise<{ recoveryCodes: string[] }> {
  await verifyPassword(registry, actor, proof.password, proof)
  if ((await findById(registry.db, actor.userId))?.totp_enabled_at == null) throw new DomainError('wrong_state')
  const now = registry.clock.now()
  return { recoveryCodes: await inTransaction(registry.db, trx => giveRecoveryCodes(registry, trx, actor, now)) }
}

import type { Knex } from 'knex'
import type { Registry } from '../../composition'
import { spendRecoveryCode, keepTotpStep, type Account } from '../../repositories/users'
import { keyedHash, unseal } from './secrets'
import { totpStep } from './totp'

/** Recovery codes are compared without spaces and hyphens, in capitals. */
export function plainCode(code: string): string {
  return code.replace(/[\s-]/g, '').toUpperCase()
}

export function recoveryHash(registry: Registry, userUid: string, code: string): string {
  return keyedHash(registry.config.secret, 'recovery', `${userUid}:${plainCode(code)}`)
}

export function totpSecretOf(registry: Registry, account: Account): string {
  return unseal(registry.config.secret, 'totp', account.uid, account.totp_secret_enc!)
}

/** Takes a code of the authenticator once; false for a wrong one and for one that was used before. */
export async function takeTotpCode(registry: Registry, db: Knex, account: Account, code: string): Promise<boolean> {
  const step = totpStep(totpSecretOf(registry, account), plainCode(code), registry.clock.now())
  return step !== null && keepTotpStep(db, account.id, step)
}

/** Takes a code of the authenticator or one of the recovery codes, each of them once. */
export async function takeSecondFactor(registry: Registry, account: Account, code: string): Promise<boolean> {
  const plain = plainCode(code)
  if (/^\d{6}$/.test(plain)) return takeTotpCode(registry, registry.db, account, plain)
  return spendRecoveryCode(registry.db, account.id, recoveryHash(registry, account.uid, plain), registry.clock.now())
}

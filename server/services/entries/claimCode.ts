import { randomInt } from 'node:crypto'
import type { Knex } from 'knex'
import { sqlTime } from '../../../db/time'
import { insertClaim } from '../../repositories/claims'
import type { Moment } from '../moment'
import { tokenHash, TOKENS } from '../notices/mint'

/** Digits and letters that nobody takes for one another when they are read aloud or copied from paper. */
const ALPHABET = '23456789ABCDEFGHJKMNPQRSTVWXYZ'
const LENGTH = 12
const GROUP = 4

/** A code by which the person whose animal it is makes an entry theirs: `K7TM-2QXD-9WPA`, 58 bits. */
export function newClaimCode(): string {
  const letters = Array.from({ length: LENGTH }, () => ALPHABET[randomInt(ALPHABET.length)])
  return letters.join('').match(new RegExp(`.{${GROUP}}`, 'g'))!.join('-')
}

/** Makes a code for an entry that nobody owns yet; only its hash is kept, so that it is told now or never. */
export async function mintClaimCode(trx: Knex, entryUid: string, moment: Moment): Promise<string> {
  const code = newClaimCode()
  await insertClaim(trx, {
    token_hash: tokenHash(code), payload: JSON.stringify({ entry: entryUid }), created_at: moment.at,
    expires_at: sqlTime(new Date(moment.now.getTime() + TOKENS.claim.livesMs)),
  })
  return code
}

/** A code as somebody typed it, in the form in which it was made; a link's token comes back as it is. */
export function normalClaimCode(typed: string): string {
  const letters = typed.toUpperCase().replace(/[\s-]/g, '')
  const plain = letters.length === LENGTH && [...letters].every(letter => ALPHABET.includes(letter))
  return plain ? letters.match(new RegExp(`.{${GROUP}}`, 'g'))!.join('-') : typed.trim()
}

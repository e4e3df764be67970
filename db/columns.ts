import type { Knex } from 'knex'

/*
 * Pieces that every migration shares. A migration that has run anywhere is history: what stands here may be
 * added to, never changed.
 */

/** For codes, uids, hashes: one byte a character, compared byte by byte. */
export const ASCII = 'CHARACTER SET ascii COLLATE ascii_bin'

/** For text that must be compared exactly, e-mails above all: no folding of case or accents, no padding. */
export const EXACT = 'CHARACTER SET utf8mb4 COLLATE utf8mb4_nopad_bin'

export const ID = 'id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY'
export const UID = `uid CHAR(36) ${ASCII} NOT NULL`

const OPTIONS = 'ENGINE=InnoDB DEFAULT CHARACTER SET utf8mb4 COLLATE utf8mb4_uca1400_nopad_ai_ci'

export interface Step {
  up: (db: Knex) => Promise<void>
  down: (db: Knex) => Promise<void>
}

function step(up: string, down: string): Step {
  return {
    up: async (db) => {
      await db.raw(up)
    },
    down: async (db) => {
      await db.raw(down)
    },
  }
}

/** One table; `body` is what stands between the brackets of CREATE TABLE. */
export const table = (name: string, body: string): Step =>
  step(`CREATE TABLE ${name} (${body}) ${OPTIONS}`, `DROP TABLE ${name}`)

/** One ALTER TABLE and what takes it back. */
export const alter = (name: string, up: string, down: string): Step =>
  step(`ALTER TABLE ${name} ${up}`, `ALTER TABLE ${name} ${down}`)

/** One trigger; `event` such as `BEFORE UPDATE`, `body` one statement. */
export const trigger = (name: string, event: string, on: string, body: string): Step =>
  step(`CREATE TRIGGER ${name} ${event} ON ${on} FOR EACH ROW ${body}`, `DROP TRIGGER ${name}`)

/** The statement by which a trigger refuses; db/errors.ts reads `rule` out of the message. */
export const refuse = (rule: string): string => `SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'rule:${rule}'`

/** `column IN ('a','b')` as a named CHECK over a closed list; NULL passes where the column allows it. */
export const oneOf = (constraint: string, column: string, values: readonly string[]): string =>
  `CONSTRAINT ${constraint} CHECK (${column} IN (${values.map(value => `'${value}'`).join(', ')}))`

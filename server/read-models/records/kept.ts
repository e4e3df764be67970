import type { Knex } from 'knex'

/** Answers kept of one database at a time; the oldest goes first. */
const MOST_KEPT = 400

interface Kept {
  version: number
  readonly answers: Map<string, Promise<unknown>>
}

/** By pool, so that two registries in one process never share an answer. */
const keptOf = new WeakMap<Knex, Kept>()

/**
 * What follows from the lists alone is read once for each version of them (`lists_version`, which grows in the transaction
 * of every change). The version is read by every request, so that no process tells more than what is true.
 */
export function keptWithLists<T>(db: Knex, version: number, key: string, read: () => Promise<T>): Promise<T> {
  let kept = keptOf.get(db)
  if (!kept || kept.version < version) keptOf.set(db, kept = { version, answers: new Map() })
  if (kept.version > version) return read()
  const { answers } = kept
  const known = answers.get(key) as Promise<T> | undefined
  if (known) return known
  const answer = read()
  answer.catch(() => answers.delete(key))
  if (answers.size >= MOST_KEPT) answers.delete(answers.keys().next().value!)
  answers.set(key, answer)
  return answer
}

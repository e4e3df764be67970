import type { Registry } from '../../composition'
import { knownFiles } from '../../repositories/documents'

const KEPT_MS = 24 * 3_600_000

/** Removes files that no row speaks of and that have lain for more than a day: leftovers of uploads that were broken off. */
export function sweepFiles(registry: Registry): Promise<number> {
  return registry.storage.sweep(new Date(Date.now() - KEPT_MS), sha256 => knownFiles(registry.db, sha256))
}

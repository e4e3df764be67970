import type { ActiveActor } from '../../../shared/domain/access/roles'
import type { Registry } from '../../composition'
import { entriesOf, type MyEntry } from '../../read-models/entries/mine'

/** The entries of a person, those that want something first. */
export function listMine(registry: Registry, actor: ActiveActor): Promise<MyEntry[]> {
  return entriesOf(registry.db, actor.userId)
}

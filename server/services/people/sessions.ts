import type { Actor } from '../../../shared/domain/access/roles'
import type { Registry } from '../../composition'
import * as sessions from '../../repositories/sessions'

/** The person behind a live session, or null when it has ended, run out, or the account is closed. */
export function findActor(registry: Registry, sessionUid: string): Promise<Actor> {
  return sessions.findActor(registry.db, sessionUid, registry.clock.now())
}

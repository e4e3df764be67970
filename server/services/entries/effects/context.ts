import type { Knex } from 'knex'
import type { Json } from '../../../../shared/domain/canonical'
import type { ActiveActor } from '../../../../shared/domain/access/roles'
import type { EntryFacts } from '../../../../shared/domain/workflow/facts'
import type { Move } from '../../../../shared/domain/workflow/transition'
import type { ClassRecord } from '../../../repositories/catalogue'
import type { EntryPatch } from '../../../repositories/entries'
import type { Moment } from '../../moment'
import type { NoticeValue } from '../../notices/queue'
import type { Workflow } from '../../workflow/load'
import type { EntryContext } from '../context'
import type { ResolvedInput } from '../moveInput'

/** What an effect works with. Effects write rows under the entry's lock and collect what the move writes at its end. */
export interface EffectContext {
  readonly trx: Knex.Transaction
  readonly context: EntryContext
  readonly facts: EntryFacts
  readonly move: Move
  readonly input: ResolvedInput
  /** null for the panel, the clock and the system */
  readonly actor: ActiveActor | null
  readonly workflow: Workflow
  readonly moment: Moment
  /** the class that the entry moves to, where the request names one */
  readonly otherClass: ClassRecord | null
  /** columns of the entry that change with this move */
  readonly patch: EntryPatch
  /** what the event keeps: ids, codes and figures */
  readonly args: Record<string, Json>
  /** what people wrote, by field */
  readonly texts: Record<string, string>
  /** what notices can say, by variable */
  readonly says: Record<string, NoticeValue>
  /** what only the caller learns, such as a claim code */
  readonly told: Record<string, string>
  /** accounts that had the entry before the move, for notices about its end */
  readonly holders: number[]
}

export type Effect = (effect: EffectContext) => Promise<void> | void

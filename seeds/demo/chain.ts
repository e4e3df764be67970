import type { Knex } from 'knex'
import type { State } from '#shared/domain/workflow/states'
import { sqlTime } from '../../db/time'
import { nextId } from '../bulk'
import type { Random } from './random'
import type { Rows } from './rows'

/** Something that happened to an entry, as the services would write it. */
export interface DemoEvent {
  readonly kind: string
  readonly from: State | null
  readonly to: State
  readonly at: Date
  readonly by: number | null
  readonly args?: Readonly<Record<string, string | number | boolean | null>>
  /** texts that people wrote: outside the hash, so that they can be erased */
  readonly texts?: Readonly<Record<string, string>>
}

import type { GuardFailure } from '#shared/domain/workflow/guards'

type Say = (key: string, params?: Record<string, unknown>, plural?: number) => string

/** Where the words of a guard's items are kept, for guards whose items are a vocabulary of their own. */
const ITEMS: Readonly<Partial<Record<GuardFailure['guard'], string>>> = {
  animal_facts_complete: 'desk.facts',
  papers_complete: 'names.documents',
  statement_signed: 'names.parts',
  every_check_ticked: 'office.checks',
  no_blocking_slip: 'desk.slips',
  class_allowed: 'desk.classLine',
  pair_named: 'desk.pair',
}

/** What stands in the way of an act, as a sentence. */
export function sayGuard(t: Say, failure: GuardFailure): string {
  const vocabulary = ITEMS[failure.guard]
  const items = vocabulary ? (failure.items ?? []).map(item => t(`${vocabulary}.${item}`)).join(', ') : String(failure.items?.length ?? 0)
  const count = Number(failure.params?.count ?? failure.items?.length ?? 0)
  return t(`desk.guards.${failure.guard}`, { items, ...failure.params, count }, count)
}

/** Why somebody may not act on an animal: `part.guide`, `owner`, `same_name.hunter`. */
export function sayStake(t: Say, stake: string): string {
  const [kind, part] = stake.split('.')
  return t(`desk.stakes.${kind}`, part ? { part: t(`names.parts.${part}`).toLowerCase() } : {})
}

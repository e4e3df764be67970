import { DomainError, type FieldError } from '../../../shared/errors'
import type { GuardFailure } from '../../../shared/domain/workflow/guards'
import type { Refusal } from '../../../shared/domain/workflow/transition'

/** Fields of the request to which a guard speaks; the others speak of the entry and are named after themselves. */
const FIELD_OF: Readonly<Partial<Record<GuardFailure['guard'], string>>> = {
  comment_given: 'comment', measurer_fit: 'measurer', measurer_without_stake: 'measurer', signed_by_password: 'password', text_given: 'text',
  confirmed: 'confirm', facts_only: 'changes', entrant_consents: 'category', same_lines: 'category', other_minimum: 'category', other_fee: 'category',
  ground_fits: 'ground',
}

function fieldsOf({ guard, items = [], params }: GuardFailure): FieldError[] {
  const code = `guard_${guard}`
  if (guard === 'place_and_day' || guard === 'ground_and_reason') return items.map(item => ({ path: item, code: 'required' }))
  return [{ path: FIELD_OF[guard] ?? guard, code, params: { ...params, items: items.join(', ') } }]
}

/** The failed guards as fields of a problem document, each with the codes of what is missing. */
export function guardFields(failed: readonly GuardFailure[]): FieldError[] {
  return failed.flatMap(fieldsOf)
}

/** A refusal of the rules as the error that the caller meets. */
export function refusalError(refusal: Refusal): DomainError {
  switch (refusal.kind) {
    case 'unknown_transition': return new DomainError('invalid_input', { fields: [{ path: 'transition', code: 'unknown' }] })
    case 'forbidden': return new DomainError('forbidden')
    case 'wrong_state': return new DomainError('wrong_state', { details: { state: refusal.state, from: [...refusal.from] } })
    case 'stake': return new DomainError('stake', { details: { stakes: [...refusal.stakes] } })
    case 'guards': return new DomainError('guard_failed', {
      fields: guardFields(refusal.failed),
      logLine: refusal.failed.map(({ guard, items = [] }) => [guard, ...items].join(' ')).join('; '),
      details: { guards: refusal.failed.map(({ guard, items, params }) => ({ guard, items: items ?? [], params: params ?? {} })) },
    })
  }
}

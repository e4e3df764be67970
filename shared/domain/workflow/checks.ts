import type { Origin } from './origins'

/** What a reviewer looks at and ticks before an entry goes to the panel. */
export const CHECK_CODES = [
  'sheet', 'photographs', 'tag_or_licence', 'proof_of_possession', 'account', 'statement', 'people', 'date_and_district', 'method',
  'class_line', 'doubles', 'eligibility',
] as const
export type CheckCode = (typeof CHECK_CODES)[number]

const PAPERS: Readonly<Record<Origin, readonly CheckCode[]>> = {
  hunted: ['tag_or_licence'],
  found: ['proof_of_possession', 'account'],
  road_killed: ['proof_of_possession', 'account'],
  agency: ['proof_of_possession', 'account'],
  inherited: ['account'],
}

/** The checks of an entry, in the order in which an office works through a file. */
export function checksFor(origin: Origin, onTheLine: boolean): CheckCode[] {
  return [
    'sheet', 'photographs', ...PAPERS[origin], 'statement', 'people', 'date_and_district',
    ...(origin === 'hunted' ? ['method' as const] : []), ...(onTheLine ? ['class_line' as const] : []), 'doubles', 'eligibility',
  ]
}

export function isCheckCode(value: unknown): value is CheckCode {
  return typeof value === 'string' && (CHECK_CODES as readonly string[]).includes(value)
}

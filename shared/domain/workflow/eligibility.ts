/** Grounds on which an entry is declined or a record struck. */
export const GROUNDS = [
  'unlawful_taking', 'unresolved_case', 'captive', 'drugged', 'barred_aid', 'hybrid', 'wrong_side_of_line', 'split_skull',
  'sheds', 'altered_parts', 'in_velvet', 'outside_region', 'under_minimum', 'already_listed', 'not_presented', 'false_statement',
] as const
export type Ground = (typeof GROUNDS)[number]

export function isGround(value: unknown): value is Ground {
  return typeof value === 'string' && (GROUNDS as readonly string[]).includes(value)
}

export interface GroundFacts {
  /** whether the sheet counts a spread, so that the skull plate has to be whole */
  readonly spreadCounts: boolean
  /** the net that the lists would use, in sixteenths; null before it is measured */
  readonly net16: number | null
  readonly minimum16: number | null
  /** whether the animal was ordered to a second measuring and not brought */
  readonly notPresented: boolean
}

/** False for a ground that the facts of the entry contradict: a skull that may be split, a net that is high enough. */
export function groundFits(ground: Ground, facts: GroundFacts): boolean {
  switch (ground) {
    case 'split_skull': return facts.spreadCounts
    case 'under_minimum': return facts.net16 !== null && facts.minimum16 !== null && facts.net16 < facts.minimum16
    case 'not_presented': return facts.notPresented
    default: return true
  }
}

/** What the class line of a district says of one class for one head. */
export const CLASS_LINE_ANSWERS = ['allowed', 'not_offered', 'barred', 'side_unknown'] as const
export type ClassLineAnswer = (typeof CLASS_LINE_ANSWERS)[number]

/** One class that a district allows for a species: everywhere in it, or on one named side of a line through it. */
export interface ClassLine {
  readonly category: string
  /** empty where no line runs through the district for this class */
  readonly side: string
}

export interface ClassLineQuestion {
  readonly category: string
  readonly offered: boolean
  /** every class line of the district for the class's species; none means that all offered classes are allowed */
  readonly lines: readonly ClassLine[]
  readonly side: string | null
}

/** Which classes an animal of a district belongs to. A district on the line asks which side; a side it does not know is asked again. */
export function askClassLine(question: ClassLineQuestion): ClassLineAnswer {
  if (!question.offered) return 'not_offered'
  if (question.lines.length === 0) return 'allowed'
  const ofClass = question.lines.filter(line => line.category === question.category)
  if (ofClass.length === 0) return 'barred'
  if (ofClass.some(line => line.side === '' || line.side === question.side)) return 'allowed'
  const sides = question.lines.map(line => line.side)
  return question.side !== null && sides.includes(question.side) ? 'barred' : 'side_unknown'
}

/** True where the answer hangs on a side of the line, so that proof of the animal's kind is wanted. */
export function isOnTheLine(question: Pick<ClassLineQuestion, 'category' | 'lines'>): boolean {
  const ofClass = question.lines.filter(line => line.category === question.category)
  return ofClass.length > 0 && ofClass.every(line => line.side !== '')
}

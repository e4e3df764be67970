import { foldedWords } from './fold'

/** How a hunter's name is printed in the lists. */
export const PRINTED_AS = ['full', 'initials', 'withheld'] as const
export type PrintedAs = (typeof PRINTED_AS)[number]

/** The name as the lists show it: whole, as initials (`W. T.`), or nothing. */
export function shownName(name: string, printedAs: PrintedAs): string {
  if (printedAs === 'withheld') return ''
  const tidy = name.trim().replace(/\s+/g, ' ')
  if (printedAs === 'full') return tidy
  return tidy.split(/[\s-]+/).map(word => `${[...word.replace(/^\P{L}+/u, '')][0] ?? ''}.`).filter(letter => letter !== '.').join(' ').toUpperCase()
}

/** The shown name with its last word in front, as lists of people are sorted; empty where the name is withheld. */
export function sortName(shown: string): string {
  const words = shown.split(' ')
  return words.length < 2 ? shown : `${words.at(-1)!}, ${words.slice(0, -1).join(' ')}`
}

const SHORTEST = 2
const LONGEST = 10

/**
 * The tokens under which a record is found: the beginnings, two to ten letters long, of the words that the lists show of
 * it. So a search for the beginning of a word is one look-up, and what it finds is in list order.
 */
export function recordTokens(record: { readonly recordNo: number, readonly formerNo: string | null, readonly hunterShown: string }): string[] {
  const words = [...foldedWords(record.hunterShown), ...foldedWords(record.formerNo ?? ''), String(record.recordNo)]
  const tokens = new Set<string>()
  for (const word of words) {
    const letters = [...word]
    for (let length = Math.min(SHORTEST, letters.length); length <= Math.min(LONGEST, letters.length); length++) tokens.add(letters.slice(0, length).join(''))
  }
  return [...tokens]
}

/** The tokens to look up for what somebody typed; every one of them has to be there. Empty where nothing can be looked for. */
export function searchTokens(text: string): string[] {
  return [...new Set(foldedWords(text).map(word => [...word].slice(0, LONGEST).join('')))]
}

/** Stands for "every district" and "every method" among the kept counts. */
export const EVERY_DISTRICT = 0
export const EVERY_METHOD = ''

interface Counted {
  readonly classId: number
  readonly districtId: number
  readonly method: string | null
}

/** The lists of its class that a record stands in: region or its district, all methods or its own. */
export function listsOf({ classId, districtId, method }: Counted): { classId: number, districtId: number, method: string }[] {
  const methods = method === null ? [EVERY_METHOD] : [EVERY_METHOD, method]
  return [EVERY_DISTRICT, districtId].flatMap(district => methods.map(one => ({ classId, districtId: district, method: one })))
}

/** Year under which a record is counted among the facets; 0 where not even the year is known. */
export function facetYear(taken: { readonly firstOn: string, readonly precision: string }): number {
  return taken.precision === 'unknown' ? 0 : Number(taken.firstOn.slice(0, 4))
}

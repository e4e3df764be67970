/** Letters that Unicode does not take apart into a base letter and a mark. */
const WHOLE_LETTERS: Readonly<Record<string, string>> = {
  ß: 'ss', æ: 'ae', œ: 'oe', ø: 'o', đ: 'd', ð: 'd', þ: 'th', ł: 'l', ħ: 'h', ı: 'i', ŋ: 'n', ŧ: 't',
}

/** Small letters without marks, for comparing and searching only; never shown. */
export function fold(text: string): string {
  return text
    .normalize('NFKD')
    .replace(/\p{M}+/gu, '')
    .toLowerCase()
    .replace(/[ßæœøđðþłħıŋŧ]/gu, letter => WHOLE_LETTERS[letter]!)
}

/** Folded words: runs of letters and digits. An apostrophe inside a word joins its halves (`O'Hara` is one word). */
export function foldedWords(text: string): string[] {
  return fold(text).replace(/['’ʼ`]/gu, '').match(/[\p{L}\p{N}]+/gu) ?? []
}

/**
 * Key under which two spellings of one person's name are taken for the same: folded, in any order of the words,
 * without single initials where two longer words are left. Empty for a name without a letter.
 */
export function nameKey(name: string): string {
  const words = foldedWords(name)
  const long = words.filter(word => word.length > 1)
  return [...(long.length >= 2 ? long : words)].sort().join(' ')
}

const ADDRESS_WORDS: Readonly<Record<string, string>> = {
  street: 'st', road: 'rd', avenue: 'ave', lane: 'ln', drive: 'dr', court: 'ct', place: 'pl', highway: 'hwy',
  north: 'n', south: 's', east: 'e', west: 'w', apartment: 'apt', box: 'box', post: 'po', office: '',
}

/** Key under which two spellings of one address are taken for the same; null for an address without a letter or digit. */
export function addressKey(address: string | null): string | null {
  const words = foldedWords(address ?? '').map(word => ADDRESS_WORDS[word] ?? word).filter(word => word !== '')
  return words.length > 0 ? words.join(' ') : null
}

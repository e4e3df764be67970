const LONGEST = 120
const UNNAMED = 'file'

/**
 * A file's name as it is shown and offered for saving: without folders, controls, marks that turn the writing
 * direction, and signs that a file system or a header reads otherwise; its ending is that of what it really is.
 */
export function cleanName(given: string | undefined, ending: string): string {
  const last = (given ?? '').normalize('NFC').split(/[/\\]/).at(-1) ?? ''
  const letters = last.replace(/[\p{Cc}\p{Cf}\p{Cs}\p{Zl}\p{Zp}]/gu, '').replace(/[<>:"|?*]/g, '_').trim()
  const stem = letters.replace(/\.[A-Za-z0-9]{1,5}$/, '').replace(/^\.+/, '').trim()
  return `${[...(stem || UNNAMED)].slice(0, LONGEST).join('')}.${ending}`
}

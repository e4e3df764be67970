/** A fact of an entry, as it is being typed, in words: for laying two versions of it side by side. */
export function useFactWords(districts: () => readonly { readonly code: string, readonly name: string }[]) {
  const { t } = useI18n()
  const words = useDeskWords()
  return function say(name: string, draft: FactsDraft): string {
    const value = draft[name]
    if (name === 'people') return draft.people.map(one => `${t(`names.parts.${one.part}`)}: ${one.name}`).join('; ')
    if (typeof value === 'boolean') return t(value ? 'entry.facts.yes' : 'entry.facts.no')
    if (typeof value !== 'string' || value === '') return ''
    switch (name) {
      case 'category': return words.category(value)
      case 'origin':
      case 'originalOrigin': return t(`names.origins.${value}`)
      case 'district': return districts().find(one => one.code === value)?.name ?? value
      case 'method': return t(`names.methods.${value}`)
      case 'sex': return t(`names.sexes.${value}`)
      case 'guided':
      case 'hunterPrintedAs': return t(`entry.facts.${value}`)
      case 'driedFrom': return t(`entry.facts.driedFroms.${value}`)
      case 'takenOn':
      case 'driedSince': return value.length === 10 ? words.date(value) : value
      default: return value
    }
  }
}

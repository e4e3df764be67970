import { dateFormat, numberFormat } from '#shared/intl'
import type { FacetsAnswer, RecordLine } from '#shared/schemas/records'

/** How the public room says classes, dates, counts and what a list holds. */
export function useRecordWords() {
  const { t, te, locale } = useI18n()
  const named = (key: string, id: string) => te(`${key}.${id}`) ? t(`${key}.${id}`) : id
  const category = (id: string) => named('animals.classes', id)
  const species = (id: string) => named('animals.species', id)
  const method = (id: string) => named('names.methods', id)
  const origin = (id: string) => named('names.origins', id)
  const sex = (id: string) => named('names.sexes', id)
  const number = (value: number) => numberFormat(locale.value).format(value)
  const count = (value: number) => t('records.count', { n: number(value) }, value)

  /** A day (`YYYY-MM-DD`), written out. */
  const day = (text: string) => dateFormat(locale.value, { dateStyle: 'long', timeZone: 'UTC' }).format(new Date(`${text}T00:00:00Z`))
  /** The public part of a date of taking: `YYYY`, `YYYY-MM` or null. */
  function taken(text: string | null): string {
    if (text === null) return t('records.unknownYear')
    if (text.length === 4) return text
    return dateFormat(locale.value, { month: 'long', year: 'numeric', timeZone: 'UTC' }).format(new Date(`${text}-01T00:00:00Z`))
  }
  const hunter = (line: Pick<RecordLine, 'hunter'>) => line.hunter || t('records.withheld')

  /** What a list holds, part by part, as its filters say it. */
  function parts(query: ListQuery, facets: Pick<FacetsAnswer, 'districts'> | null | undefined): { readonly names: readonly FilterName[], readonly text: string }[] {
    const { from, to } = query
    const years = from && to
      ? (from === to ? t('records.parts.in', { from }) : t('records.parts.between', { from, to }))
      : from ? t('records.parts.from', { from }) : to ? t('records.parts.to', { to }) : null
    return [
      { names: ['category', 'species'], text: query.category ? category(query.category) : query.species ? t('records.parts.allOf', { species: species(query.species) }) : t('records.parts.everySpecies') },
      { names: ['district'], text: query.district ? facets?.districts.find(one => one.code === query.district)?.name ?? query.district : t('records.parts.allDistricts') },
      { names: ['method'], text: query.method ? method(query.method).toLowerCase() : t('records.parts.anyMethod') },
      ...(years ? [{ names: ['from', 'to'] as const, text: years }] : []),
      ...(query.sex ? [{ names: ['sex'] as const, text: t('records.parts.sex', { sex: sex(query.sex).toLowerCase() }) }] : []),
      ...(query.minNet ? [{ names: ['minNet'] as const, text: t('records.parts.minNet', { minNet: query.minNet }) }] : []),
      ...(query.q ? [{ names: ['q'] as const, text: t('records.parts.q', { q: query.q }) }] : []),
    ]
  }

  /** Classes by species, in the registry's order, with what the lists hold of them. */
  function bySpecies(facets: Pick<FacetsAnswer, 'categories'> | null | undefined) {
    const groups = new Map<string, FacetsAnswer['categories']>()
    for (const one of facets?.categories ?? []) groups.set(one.species, [...groups.get(one.species) ?? [], one])
    return [...groups].map(([id, categories]) => ({ species: id, categories }))
  }
  return { category, species, method, origin, sex, number, count, day, taken, hunter, parts, bySpecies }
}

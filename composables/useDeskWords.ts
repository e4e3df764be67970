import { dateFormat, listFormat, numberFormat } from '#shared/intl'
import type { DeskLine } from '#shared/schemas/desk'

/** How the desk says classes, days, dates and money in the reader's language and the registry's zone. */
export function useDeskWords() {
  const { t, te, locale } = useI18n()
  const { me } = useMe()
  const zone = () => me.value?.registry.timeZone ?? 'UTC'

  const category = (id: string) => te(`animals.classes.${id}`) ? t(`animals.classes.${id}`) : id
  const species = (id: string) => te(`animals.species.${id}`) ? t(`animals.species.${id}`) : id
  const days = (count: number) => t('desk.days', { count }, count)
  const left = (count: number) => count < 0 ? t('desk.overdue', { count: -count }, -count) : t('common.daysLeft', { count }, count)

  /** A day (`YYYY-MM-DD`), written out. */
  const date = (day: string) => dateFormat(locale.value, { dateStyle: 'long', timeZone: 'UTC' }).format(new Date(`${day}T00:00:00Z`))
  /** An instant as a day, and with its time of day, in the registry's zone. */
  const dayOf = (at: string) => dateFormat(locale.value, { dateStyle: 'long', timeZone: zone() }).format(new Date(at))
  const time = (at: string) => dateFormat(locale.value, { dateStyle: 'long', timeStyle: 'short', timeZone: zone() }).format(new Date(at))
  /** A date as far as it is known: `YYYY`, `YYYY-MM`, `YYYY-MM-DD` or `unknown`. */
  function inexact(text: string | null): string {
    if (!text || text === 'unknown') return t('desk.unknownDate')
    if (text.length === 4) return text
    if (text.length === 10) return date(text)
    return dateFormat(locale.value, { month: 'long', year: 'numeric', timeZone: 'UTC' }).format(new Date(`${text}-01T00:00:00Z`))
  }
  const money = (minor: number, currency: string) => numberFormat(locale.value, { style: 'currency', currency }).format(minor / 100)
  const list = (items: readonly string[]) => listFormat(locale.value).format(items)

  return { category, species, days, left, date, dayOf, time, inexact, money, list }
}

/** Where a line of the desk leads. */
export function placeOf(line: Pick<DeskLine, 'kind' | 'id' | 'sittingId'>): string {
  switch (line.kind) {
    case 'measure': return `/desk/bench/${line.id}`
    case 'review':
    case 'check_report': return `/desk/office/${line.id}`
    case 'plan_sitting': return '/desk/panel/new'
    case 'read_file':
    case 'vote': return `/desk/panel/${line.sittingId}/${line.id}`
    case 'second_measuring': return '/desk/panel'
    case 'open_sitting':
    case 'close_sitting': return `/desk/panel/${line.id}`
    case 'role_proposal': return '/desk/registrar/people'
    default: return `/desk/entries/${line.id}`
  }
}

const ROOM_OF = {
  finish_draft: 'entries', submit: 'entries', answer: 'entries', appeal: 'entries', revive: 'entries', answer_challenge: 'entries', unclaimed: 'entries',
  measure: 'bench', review: 'office', check_report: 'office', plan_sitting: 'panel', read_file: 'panel', vote: 'panel', second_measuring: 'panel',
  open_sitting: 'panel', close_sitting: 'panel', role_proposal: 'people',
} as const satisfies Record<DeskLine['kind'], string>

/** The room of the desk that a line belongs to. */
export const roomOf = (kind: DeskLine['kind']) => ROOM_OF[kind]

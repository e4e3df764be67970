import { dateFormat, numberFormat } from '../../../shared/intl'
import type { Settings } from '../settings/read'
import { t } from '../texts/translate'
import { layoutHtml, layoutText, type Letter } from '../../mail/layout'
import type { NoticeValue } from './queue'
import { TEMPLATES, type TemplateName } from './templates'

export interface RenderContext {
  readonly locale: string
  readonly settings: Settings
  /** Where the notice's link leads, complete; null for none. */
  readonly link: string | null
}

export interface RenderedNotice {
  readonly subject: string
  readonly text: string
  readonly html: string
}

/**
 * Says a notice in the reader's language, as text and as HTML.
 *
 * @throws RangeError for a value that the template does not list: texts may name listed variables only
 */
export function renderNotice(template: TemplateName, args: Readonly<Record<string, NoticeValue>>, context: RenderContext): RenderedNotice {
  const { variables } = TEMPLATES[template]
  const values: Record<string, string> = {}
  for (const name of variables) values[name] = ''
  for (const [name, value] of Object.entries(args)) {
    if (!(variables as readonly string[]).includes(name)) throw new RangeError(`the notice ${template} has no variable ${name}`)
    values[name] = say(value, context)
  }
  const society = context.settings.societyName || t(context.locale, 'common.name')
  const letter: Letter = {
    locale: context.locale,
    society,
    greeting: t(context.locale, values.name ? 'notices.greeting' : 'notices.greetingPlain', { name: values.name ?? '' }),
    paragraphs: paragraphsOf(context.locale, `notices.${template}.body`, values),
    action: context.link === null ? null : { words: t(context.locale, `notices.${template}.action`), link: context.link },
    footer: t(context.locale, 'notices.footer', { society }),
  }
  return {
    subject: oneLine(t(context.locale, `notices.${template}.subject`, values)),
    text: layoutText(letter),
    html: layoutHtml(letter),
  }
}

/** Paragraphs of a text; one that names a variable without a value is left out, so that no sentence has a hole. */
function paragraphsOf(locale: string, key: string, values: Readonly<Record<string, string>>): string[] {
  // Marks the holes with a letter that no text holds, to see which paragraphs they stand in.
  const HOLE = '\u{F0000}'
  const marked = Object.fromEntries(Object.entries(values).map(([name, value]) => [name, value === '' ? HOLE : value.replaceAll('\n\n', '\n')]))
  return t(locale, key, marked).split('\n\n').map(paragraph => paragraph.trim()).filter(paragraph => paragraph !== '' && !paragraph.includes(HOLE))
}

function say(value: NoticeValue, { locale, settings }: RenderContext): string {
  if (value === null) return ''
  if (typeof value === 'string') return withoutControls(value)
  if (typeof value === 'number') return numberFormat(locale).format(value)
  if ('text' in value) return t(locale, value.text, value.params)
  if ('day' in value) return dateFormat(locale, { dateStyle: 'long', timeZone: 'UTC' }).format(new Date(`${value.day}T00:00:00Z`))
  if ('instant' in value) return dateFormat(locale, { dateStyle: 'long', timeStyle: 'short', timeZone: settings.timeZone }).format(new Date(value.instant))
  return value.list.map(line => `– ${oneLine(withoutControls(line))}`).join('\n')
}

/** Letters that could end a header or play tricks with the direction of reading do not come from a person's text. */
function withoutControls(text: string): string {
  return text.replace(/[\u202A-\u202E\u2066-\u2069\u{F0000}]|[^\P{Cc}\n]/gu, '')
}

function oneLine(text: string): string {
  return text.replace(/\s+/g, ' ').trim()
}

import { describe, expect, test } from 'vitest'
import texts from '../../../i18n/locales/en/notices.json'
import { renderNotice, type RenderContext } from '../../../server/services/notices/render'
import { TEMPLATES, templateFor, type TemplateName } from '../../../server/services/notices/templates'
import { WORKFLOW_TRANSITIONS } from '../../../seeds/reference/workflow'

const SETTINGS = { societyName: 'A Society', regionName: 'A Region', timeZone: 'America/Denver', currency: 'USD', officeEmail: 'office@ochrebasin.example' }
const context: RenderContext = { locale: 'en', settings: SETTINGS, link: 'https://lists.ochrebasin.example/desk?a=1&b=2' }
const names = Object.keys(TEMPLATES) as TemplateName[]
const said = texts.notices as unknown as Record<string, { subject: string, body: string, action?: string }>

describe('every notice', () => {
  test.each(names)('%s has its texts, which name listed variables only', (name) => {
    const { subject, body, action } = said[name]!
    const { variables, target } = TEMPLATES[name]
    const named = [...`${subject} ${body} ${action ?? ''}`.matchAll(/\{(\w+)\}/g)].map(([, variable]) => variable)
    expect([...variables]).toEqual(expect.arrayContaining(named))
    expect(action !== undefined).toBe(target !== 'none')
  })

  test('no text is without a template', () => {
    const known = new Set<string>([...names, 'greeting', 'greetingPlain', 'footer'])
    expect(Object.keys(said).filter(name => !known.has(name))).toEqual([])
  })

  test.each(names)('%s reads well with every value and with none', (name) => {
    const all = Object.fromEntries(TEMPLATES[name].variables.map(variable => [variable, `<${variable}>`]))
    for (const args of [all, {}]) {
      const { subject, text, html } = renderNotice(name, args, TEMPLATES[name].target === 'none' ? { ...context, link: null } : context)
      expect(subject).not.toMatch(/\n|\{|notices\./)
      expect(text).not.toMatch(/\{\w+\}|notices\.|undefined|\u{F0000}/u)
      expect(html).not.toMatch(/<(?:name|animal|comment|text|reason)>/)
    }
  })

  test('each notice of the seeded workflow has words of its own', () => {
    const wanted = WORKFLOW_TRANSITIONS.flatMap(({ code, effects }) => effects
      .filter(effect => effect.startsWith('tell_'))
      .map(effect => [code, effect.slice('tell_'.length)] as const))
    expect(wanted.length).toBeGreaterThan(20)
    expect(wanted.filter(([code, audience]) => templateFor(code, audience) === 'change_of_entry').map(pair => pair.join('_'))).toEqual([])
  })
})

describe('what a person wrote', () => {
  test('is text in the HTML, whatever it holds', () => {
    const { html, text } = renderNotice('hand_back_entrant', { name: 'A', animal: 'B', comment: '<img src=x onerror=alert(1)> & "so"' }, context)
    expect(html).toContain('&lt;img src=x onerror=alert(1)&gt; &amp; &quot;so&quot;')
    expect(text).toContain('<img src=x onerror=alert(1)> & "so"')
  })

  test('cannot end a header or turn the direction of reading', () => {
    const { subject } = renderNotice('submit_entrant', { name: 'A', animal: 'Elk\r\nBcc: x@y.example \u202E' }, context)
    expect(subject).toBe('Received: Elk Bcc: x@y.example')
  })

  test('cannot bring texts of its own: braces and pipes stay what they are', () => {
    const { text } = renderNotice('hand_back_entrant', { name: 'A', animal: 'B', comment: '{name} | @:common.name %' }, context)
    expect(text).toContain('{name} | @:common.name %')
  })

  test('a value that the template does not list is refused', () => {
    expect(() => renderNotice('submit_entrant', { address: '12 Somewhere' }, context)).toThrow(RangeError)
  })
})

test('a paragraph without its value is left out', () => {
  const { text } = renderNotice('accept_entrant', { name: 'A', animal: 'Elk', recordNo: 'OB-1', net: '300 0/8', rank: '' }, context)
  expect(text).toContain('OB-1')
  expect(text).not.toMatch(/rank today/)
})

test('days, instants and lists are said in the reader\'s language and the registry\'s zone', () => {
  const { text } = renderNotice('return_entrant', { name: 'A', animal: 'Elk', requests: { list: ['the tag', 'a photograph'] }, deadline: { day: '2026-03-31' } }, context)
  expect(text).toContain('– the tag\n– a photograph')
  expect(text).toContain('March 31, 2026')
  const remeasure = renderNotice('order_remeasure_entrant', { name: 'A', animal: 'Elk', place: 'the hall', at: { instant: '2026-03-31T01:30:00Z' }, comment: null }, context)
  expect(remeasure.text).toMatch(/March 30, 2026 at 7:30/)
})

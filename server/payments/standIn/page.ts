import { formatMoney } from '../../services/payments/money'
import { t } from '../../services/texts/translate'
import type { Faults, Session } from './service'

const escape = (text: string) => text.replace(/[&<>"']/g, letter => `&#${letter.charCodeAt(0)};`)
const say = (key: string, params: Record<string, unknown> = {}) => escape(t('en', `payments.standIn.${key}`, params))

/** Colours follow look.md's tokens; the page is not part of the application and carries its own few lines of style. */
export const PAGE_STYLE = `
:root { color-scheme: light dark; --paper: #F6F1E7; --card: #FFFDF8; --ink: #20261E; --muted: #5A5F50; --accent: #855600; --decline: #7A1F2B }
@media (prefers-color-scheme: dark) { :root { --paper: #15181A; --card: #1E2224; --ink: #ECE6D6; --muted: #A7A592; --accent: #E2AC44; --decline: #EA929A } }
body { margin: 0; background: var(--paper); color: var(--ink); font: 16px/1.55 Lato, system-ui, sans-serif }
main { max-width: 30rem; margin: 0 auto; padding: 2rem 1rem }
h1 { font: bold 1.5rem/1.25 Merriweather, Georgia, serif; margin: 0 0 .5rem }
.sum { font: bold 2rem Merriweather, Georgia, serif; margin: 1rem 0 }
.note { border-left: 4px solid var(--accent); background: var(--card); padding: .75rem 1rem; margin: 1rem 0 }
.bad { border-color: var(--decline) }
button { display: block; width: 100%; min-height: 44px; margin: .5rem 0; font: bold 1rem Lato, system-ui, sans-serif; border: 1px solid var(--ink); border-radius: 2px; background: var(--card); color: var(--ink); cursor: pointer }
button.first { background: var(--accent); border-color: var(--accent); color: var(--paper) }
:focus-visible { outline: 2px solid var(--accent); outline-offset: 2px }
ul { padding-left: 1.2rem } a { color: var(--accent) } .muted { color: var(--muted) }
`

function page(title: string, body: string): string {
  return `<!DOCTYPE html><html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1"><title>${title}</title><link rel="icon" href="/favicon.svg"><style>${PAGE_STYLE}</style></head><body><main>${body}</main></body></html>`
}

const button = (name: string, value: string, label: string, first = false) =>
  `<button name="${name}" value="${value}"${first ? ' class="first"' : ''}>${label}</button>`

/** The page to pay on: one button for each way in which a payment can go. */
export function payPage(session: Session, declined: boolean): string {
  const sum = escape(formatMoney('en-US', session.amount_total, session.currency.toUpperCase()))
  const head = `<h1>${say('title')}</h1><p class="note">${say('note')}</p>`
  if (session.status !== 'open') {
    return page(say('title'), `${head}<p>${say(session.status === 'complete' ? 'paidBefore' : 'expired')}</p><p><a href="${escape(session.status === 'complete' ? session.success_url : session.cancel_url)}">${say('back')}</a></p>`)
  }
  return page(say('title'), `${head}
<p>${escape(session.title)}</p><p class="sum">${sum}</p>
${declined ? `<p class="note bad" role="alert">${say('declined')}</p>` : ''}
<form method="post">
${button('card', 'taken', say('pay'), true)}
${button('card', 'declined', say('decline'))}
${button('card', 'left', say('leave'))}
${button('card', 'expired', say('expire'))}
</form>`)
}

/** Every session, and switches for the ways in which the service can fail. */
export function controlPage(sessions: readonly Session[], faults: Faults): string {
  const lines = sessions.slice().sort((a, b) => b.created - a.created).slice(0, 50).map(session =>
    `<li><a href="/pay/${escape(session.id)}">${escape(session.title)}</a>, ${escape(formatMoney('en-US', session.amount_total, session.currency.toUpperCase()))}: ${say(`status.${session.status}`)}</li>`)
  const switches = (Object.keys(faults) as (keyof Faults)[]).map(name =>
    button(name, String(!faults[name]), say(`${faults[name] ? 'off' : 'on'}.${name}`)))
  return page(say('controls'), `<h1>${say('controls')}</h1><p class="note">${say('note')}</p><form method="post" action="/pay">${switches.join('')}</form>
<h2>${say('sessions')}</h2>${lines.length > 0 ? `<ul>${lines.join('')}</ul>` : `<p class="muted">${say('none')}</p>`}`)
}

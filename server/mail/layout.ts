/** What every notice is made of. All of it is plain text; only the layout knows HTML. */
export interface Letter {
  readonly locale: string
  readonly society: string
  readonly greeting: string
  readonly paragraphs: readonly string[]
  readonly action: { readonly words: string, readonly link: string } | null
  readonly footer: string
}

/** The letter as plain text. The link stands on a line of its own, so that every mail program makes it one. */
export function layoutText(letter: Letter): string {
  return [
    letter.greeting,
    ...letter.paragraphs,
    ...(letter.action ? [`${letter.action.words}:\n${letter.action.link}`] : []),
    `-- \n${letter.society}\n${letter.footer}`,
  ].join('\n\n')
}

/** The letter as HTML: one column, no picture, nothing fetched from anywhere. */
export function layoutHtml(letter: Letter): string {
  const paragraph = (text: string) => `<p style="margin:0 0 16px">${escapeHtml(text).replaceAll('\n', '<br>')}</p>`
  const action = letter.action
    ? `<p style="margin:24px 0"><a href="${escapeHtml(letter.action.link)}" style="display:inline-block;padding:10px 18px;background:#855600;color:#ffffff;text-decoration:none;border-radius:2px">${escapeHtml(letter.action.words)}</a></p>
<p style="margin:0 0 16px;font-size:13px;color:#5c564c;word-break:break-all">${escapeHtml(letter.action.link)}</p>`
    : ''
  return `<!doctype html>
<html lang="${escapeHtml(letter.locale)}">
<head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1"><title>${escapeHtml(letter.society)}</title></head>
<body style="margin:0;background:#F6F1E7;color:#1F1B16;font:16px/1.55 Lato,Helvetica,Arial,sans-serif">
<div style="max-width:36em;margin:0 auto;padding:24px 20px">
<p style="margin:0 0 24px;padding-bottom:8px;border-bottom:1px solid #cfc5b2;font:700 18px/1.3 Merriweather,Georgia,serif">${escapeHtml(letter.society)}</p>
${paragraph(letter.greeting)}
${letter.paragraphs.map(paragraph).join('\n')}
${action}
<p style="margin:32px 0 0;padding-top:8px;border-top:1px solid #cfc5b2;font-size:13px;color:#5c564c">${escapeHtml(letter.footer)}</p>
</div>
</body>
</html>
`
}

const ENTITIES: Readonly<Record<string, string>> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', '\'': '&#39;' }

function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, letter => ENTITIES[letter]!)
}

import { readdirSync, readFileSync } from 'node:fs'
import path from 'node:path'
import { expect, test } from 'vitest'
import { filesOf, ROOT } from './files'

const FOLDER = path.join(ROOT, 'i18n/locales/en')

function leaves(node: unknown, at: string): string[] {
  if (node === null || typeof node !== 'object') return [at]
  return Object.entries(node).flatMap(([key, value]) => leaves(value, at ? `${at}.${key}` : key))
}

const rooms = readdirSync(FOLDER).filter(name => name.endsWith('.json'))
const keys = rooms.flatMap(room => leaves(JSON.parse(readFileSync(path.join(FOLDER, room), 'utf8')), ''))
const known = new Set(keys)
const tops = new Set(keys.map(key => key.split('.')[0]!))

const sources = filesOf(['.ts', '.vue']).filter(file => !/^(tests|i18n|scripts\/bench)\//.test(file))
const code = sources.map(file => ({ file, text: readFileSync(path.join(ROOT, file), 'utf8') }))

/** `t('a.b')` and the like: a whole key, said where it is used. */
const CALL = /(?<![\w.])(?:\$?t|te|tm|hasText)\(\s*(?:[\w.?! ]+,\s*)?(['"`])([^'"`$]+)\1/g
/** A key with a changing part: `t(`states.${state}.name`)`. */
const PARTLY = /[`'"]([a-z]\w*(?:\.\w+)*\.)\$\{[^`]*?\}([^`]*)`/g

test('each room\'s file begins with its own name', () => {
  for (const room of rooms) {
    expect(Object.keys(JSON.parse(readFileSync(path.join(FOLDER, room), 'utf8'))), room).toEqual([room.replace('.json', '')])
  }
})

test('no text is asked for that is not there', () => {
  const missing = code.flatMap(({ file, text }) => [...text.matchAll(CALL)]
    .map(([, , key]) => key!)
    .filter(key => key.includes('.') && tops.has(key.split('.')[0]!))
    .filter(key => !known.has(key) && !keys.some(one => one.startsWith(`${key}.`)))
    .map(key => `${file}: ${key}`))
  expect(missing).toEqual([])
})

test('no text is there that nobody asks for', () => {
  const all = code.map(({ text }) => text).join('\n')
  const beginnings = [...new Set([...all.matchAll(PARTLY)].map(([, before]) => before!))]
  // Said by their code alone: `errors.<code>`, `notices.<template>`, `animals.<…>` and what the domain lists.
  const byCode = ['errors.', 'notices.', 'states.', 'animals.', 'names.', 'sheet.']
  const unused = keys.filter(key =>
    !byCode.some(room => key.startsWith(room))
    && !beginnings.some(beginning => key.startsWith(beginning))
    && !all.includes(key)
    // A branch that is handed on whole: t(`${base}.title`) with base = 'account.reset'.
    && !key.split('.').some((_, depth, parts) => depth > 1 && new RegExp(`['"\`]${parts.slice(0, depth).join('\\.')}['"\`]`).test(all)))
  expect(unused).toEqual([])
})

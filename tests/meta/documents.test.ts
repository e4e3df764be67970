import { existsSync, readFileSync } from 'node:fs'
import path from 'node:path'
import { describe, expect, test } from 'vitest'
import { filesOf, ROOT } from './files'

const documents = filesOf(['.md']).filter(file => !file.includes('node_modules'))
const pkg = JSON.parse(readFileSync(path.join(ROOT, 'package.json'), 'utf8')) as { scripts: Record<string, string> }

describe('documents', () => {
  test.each(documents)('the links of %s lead somewhere', (file) => {
    const text = readFileSync(path.join(ROOT, file), 'utf8')
    const dead = [...text.matchAll(/\]\(([^)#]+)(?:#[^)]*)?\)/g)].map(([, target]) => target!)
      .filter(target => !/^[a-z]+:/.test(target))
      .filter(target => !existsSync(path.resolve(ROOT, path.dirname(file), target)))
    expect(dead).toEqual([])
  })

  test.each(documents)('the commands of %s are there', (file) => {
    const text = readFileSync(path.join(ROOT, file), 'utf8')
    const unknown = [...text.matchAll(/npm run ([\w:-]+)/g)].map(([, name]) => name!).filter(name => !(name in pkg.scripts))
    expect(unknown).toEqual([])
  })

  test('every decision is in the index', () => {
    const index = readFileSync(path.join(ROOT, 'docs/decisions/README.md'), 'utf8')
    const missing = documents.filter(file => file.startsWith('docs/decisions/') && !file.endsWith('README.md')).filter(file => !index.includes(`](${path.basename(file)})`))
    expect(missing).toEqual([])
  })
})

test('no file says how the work is organised or names a path of one machine', () => {
  const mark = new RegExp([['', 'work', '(?:main|wt|brief|shared)', ''].join('/'), ['registry', 'npmjs', 'org'].join('\\.')].join('|'))
  const found = filesOf(['.ts', '.vue', '.mjs', '.md', '.json', '.css', '.sh'])
    .filter(file => file !== 'package-lock.json')
    .filter(file => mark.test(readFileSync(path.join(ROOT, file), 'utf8')))
  expect(found).toEqual([])
})

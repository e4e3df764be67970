import { createHash } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import { CATEGORIES, classesFor, currentDefinition, DEFINITIONS, definitionById, isCategory } from '#shared/domain/measuring/index'
import frozen from './definitions.frozen.json'

const hash = (value: unknown) => createHash('sha256').update(JSON.stringify(value)).digest('hex')

describe('sheet definitions', () => {
  it('never change once they have a number: a correction is a new number', () => {
    expect(Object.fromEntries(DEFINITIONS.map((definition) => [definition.id, hash(definition)]))).toEqual(frozen)
  })

  it('are named by class and number', () => {
    for (const definition of DEFINITIONS) {
      expect(definition.id).toBe(`${definition.category}@${definition.number}`)
      expect(definitionById(definition.id)).toBe(definition)
    }
    expect(definitionById('mule-deer-typical@99')).toBeUndefined()
  })

  it('there is one in force for each of the 27 classes', () => {
    expect(CATEGORIES).toHaveLength(27)
    for (const category of CATEGORIES) expect(currentDefinition(category).category).toBe(category)
    expect([isCategory('cougar'), isCategory('house-cat'), isCategory('constructor')]).toEqual([true, false, false])
  })

  it.each(DEFINITIONS.map((definition) => [definition.id, definition] as const))('%s names only lines that it has, each once', (_, definition) => {
    const ids = definition.lines.map((line) => line.id)
    expect(new Set(ids).size).toBe(ids.length)
    const named = definition.slips.flatMap((rule) => [
      ...('line' in rule ? [rule.line] : []), ...('pairs' in rule ? rule.pairs.flatMap(({ from, to }) => [from, to]) : []), ...('base' in rule ? [rule.base, ...rule.quarters] : []),
      ...('points' in rule ? rule.points : []),
    ])
    const figures = definition.keyFigures.flatMap((rule) => ('points' in rule ? [rule.beam, ...rule.points] : 'lines' in rule ? rule.lines : [rule.line]))
    const caps = definition.lines.flatMap((line) => (line.kind === 'credit' && line.capBy ? [line.capBy] : []))
    for (const id of [...named, ...figures, ...caps]) expect(ids).toContain(id)
  })

  it('typical and non-typical of a species differ in nothing but what happens to abnormal points', () => {
    for (const category of CATEGORIES.filter((id) => currentDefinition(id).typicality === 'typical')) {
      const [typical, other] = classesFor(category).map(currentDefinition)
      const plain = (lines: readonly { kind: string }[]) => lines.map((line) => ({ ...line, kind: line.kind.replace(/^(deducted|added)List$/, 'list') }))
      expect(plain(other!.lines)).toEqual(plain(typical!.lines))
      expect(other!.lines).not.toEqual(typical!.lines)
      expect([other!.slips, other!.typicality]).toEqual([typical!.slips, 'nontypical'])
    }
  })
})

import type { SheetDefinition } from './sheet'
import { DEER } from './sheets/deer'
import { ELK } from './sheets/elk'
import { HORNS } from './sheets/horns'
import { PALMED } from './sheets/palmed'
import { SKULLS } from './sheets/skulls'

const ALL = [...DEER, ...ELK, ...PALMED, ...HORNS, ...SKULLS] as const

/** A class of animal with a sheet of its own. */
export type Category = (typeof ALL)[number]['category']

/** Every numbered definition that a sheet can be scored by, the superseded ones too. */
export const DEFINITIONS: readonly SheetDefinition<Category>[] = ALL

const byId = new Map<string, SheetDefinition<Category>>(DEFINITIONS.map((definition) => [definition.id, definition]))

const newest = new Map<string, SheetDefinition<Category>>()
for (const definition of DEFINITIONS) {
  const known = newest.get(definition.category)
  if (!known || known.number < definition.number) newest.set(definition.category, definition)
}

/** The classes, each once, in the order in which they are shown. */
export const CATEGORIES: readonly Category[] = [...newest.keys()] as Category[]

export function isCategory(text: string): text is Category {
  return newest.has(text)
}

/** The definition that a sheet begun today is scored by. */
export function currentDefinition(category: Category): SheetDefinition<Category> {
  return newest.get(category) as SheetDefinition<Category>
}

/** The definition with this id, such as `mule-deer-typical@1`, for as long as any sheet names it. */
export function definitionById(id: string): SheetDefinition<Category> | undefined {
  return byId.get(id)
}

/**
 * The classes that one set of measurements can enter, its own among them: typical and non-typical of one species have
 * the same lines and differ only in what happens to abnormal points ("Typical versus non-typical", Buck Manager, 2008).
 */
export function classesFor(category: Category): readonly Category[] {
  const { species } = currentDefinition(category)
  return CATEGORIES.filter((other) => currentDefinition(other).species === species)
}

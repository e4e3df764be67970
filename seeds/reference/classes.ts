import type { SpeciesCode } from './species'

interface ClassSeed {
  readonly code: string
  readonly species: SpeciesCode
  readonly definition: string
  readonly step: '1/8' | '1/16'
  readonly typicality: 'typical' | 'nontypical' | 'single'
}

const single = (species: SpeciesCode, step: ClassSeed['step'] = '1/8'): ClassSeed =>
  ({ code: species, species, definition: `${species}@1`, step, typicality: 'single' })

const both = (species: SpeciesCode): ClassSeed[] =>
  (['typical', 'nontypical'] as const).map(typicality => ({
    code: `${species}-${typicality}`, species, definition: `${species}-${typicality}@1`, step: '1/8', typicality,
  }))

/** Every class the engine has a sheet for; a registry says which of them it offers. */
export const CLASSES: readonly ClassSeed[] = [
  ...both('whitetail'), ...both('coues'), ...both('mule-deer'), ...both('columbia-blacktail'), ...both('sitka-blacktail'),
  ...both('elk'), single('roosevelt-elk'), single('tule-elk'),
  single('moose'), single('caribou'), single('pronghorn'),
  single('bighorn-sheep'), single('desert-sheep'), single('dall-sheep'), single('stone-sheep'),
  single('mountain-goat'), single('bison'), single('muskox'),
  single('black-bear', '1/16'), single('grizzly-bear', '1/16'), single('cougar', '1/16'),
]

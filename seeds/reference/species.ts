/** Species whose sheets the engine knows. Names by common usage of taxonomy; order as lists are read aloud. */
export const SPECIES = [
  { code: 'whitetail', scientific_name: 'Odocoileus virginianus', family: 'deer' },
  { code: 'coues', scientific_name: 'Odocoileus virginianus couesi', family: 'deer' },
  { code: 'mule-deer', scientific_name: 'Odocoileus hemionus', family: 'deer' },
  { code: 'columbia-blacktail', scientific_name: 'Odocoileus hemionus columbianus', family: 'deer' },
  { code: 'sitka-blacktail', scientific_name: 'Odocoileus hemionus sitkensis', family: 'deer' },
  { code: 'elk', scientific_name: 'Cervus canadensis', family: 'elk' },
  { code: 'roosevelt-elk', scientific_name: 'Cervus canadensis roosevelti', family: 'elk' },
  { code: 'tule-elk', scientific_name: 'Cervus canadensis nannodes', family: 'elk' },
  { code: 'moose', scientific_name: 'Alces alces', family: 'moose' },
  { code: 'caribou', scientific_name: 'Rangifer tarandus', family: 'caribou' },
  { code: 'pronghorn', scientific_name: 'Antilocapra americana', family: 'pronghorn' },
  { code: 'bighorn-sheep', scientific_name: 'Ovis canadensis', family: 'sheep' },
  { code: 'desert-sheep', scientific_name: 'Ovis canadensis nelsoni', family: 'sheep' },
  { code: 'dall-sheep', scientific_name: 'Ovis dalli dalli', family: 'sheep' },
  { code: 'stone-sheep', scientific_name: 'Ovis dalli stonei', family: 'sheep' },
  { code: 'mountain-goat', scientific_name: 'Oreamnos americanus', family: 'goat' },
  { code: 'bison', scientific_name: 'Bison bison', family: 'bison' },
  { code: 'muskox', scientific_name: 'Ovibos moschatus', family: 'muskox' },
  { code: 'black-bear', scientific_name: 'Ursus americanus', family: 'skull' },
  { code: 'grizzly-bear', scientific_name: 'Ursus arctos', family: 'skull' },
  { code: 'cougar', scientific_name: 'Puma concolor', family: 'skull' },
] as const

export type SpeciesCode = (typeof SPECIES)[number]['code']

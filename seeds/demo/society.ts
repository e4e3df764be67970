/** The Ochre Basin Record Society: a society, a region and figures that exist nowhere else. */

export const SOCIETY_SETTINGS = {
  societyName: 'Ochre Basin Record Society',
  regionName: 'Ochre Basin',
  timeZone: 'America/Denver',
  currency: 'USD',
  officeEmail: 'office@ochrebasin.example',
} as const

/** Districts by name; `code` is what URLs carry. */
export const DISTRICTS = [
  { code: 'alderfall', name: 'Alderfall' },
  { code: 'brackwater', name: 'Brackwater' },
  { code: 'coldiron', name: 'Coldiron' },
  { code: 'elder-reach', name: 'Elder Reach' },
  { code: 'fennickshaw', name: 'Fennickshaw' },
  { code: 'hollowmarch', name: 'Hollowmarch' },
  { code: 'juniper-fork', name: 'Juniper Fork' },
  { code: 'kestrelden', name: 'Kestrelden' },
  { code: 'larkmoor', name: 'Larkmoor' },
  { code: 'otterstone', name: 'Otterstone' },
  { code: 'quillan-flats', name: 'Quillan Flats' },
  { code: 'skarncliff', name: 'Skarncliff' },
  { code: 'thornwether', name: 'Thornwether' },
  { code: 'varrowmere', name: 'Varrowmere' },
] as const
export type DistrictCode = (typeof DISTRICTS)[number]['code']

export const NEIGHBOURS: readonly (readonly [DistrictCode, DistrictCode])[] = [
  ['alderfall', 'brackwater'], ['alderfall', 'coldiron'], ['alderfall', 'skarncliff'],
  ['brackwater', 'coldiron'], ['brackwater', 'varrowmere'], ['brackwater', 'hollowmarch'],
  ['coldiron', 'skarncliff'], ['coldiron', 'elder-reach'], ['coldiron', 'hollowmarch'],
  ['elder-reach', 'skarncliff'], ['elder-reach', 'fennickshaw'], ['elder-reach', 'kestrelden'], ['elder-reach', 'hollowmarch'],
  ['fennickshaw', 'kestrelden'], ['fennickshaw', 'thornwether'],
  ['hollowmarch', 'varrowmere'], ['hollowmarch', 'juniper-fork'], ['hollowmarch', 'kestrelden'],
  ['juniper-fork', 'varrowmere'], ['juniper-fork', 'kestrelden'], ['juniper-fork', 'larkmoor'], ['juniper-fork', 'quillan-flats'],
  ['kestrelden', 'larkmoor'], ['kestrelden', 'thornwether'],
  ['larkmoor', 'thornwether'], ['larkmoor', 'otterstone'], ['larkmoor', 'quillan-flats'],
  ['otterstone', 'quillan-flats'], ['otterstone', 'thornwether'],
]

/**
 * How often an animal of a species comes from each district; a district that is missing has none, and its class line
 * lets no class of that species in.
 */
export const RANGES = {
  'mule-deer': { alderfall: 6, brackwater: 4, coldiron: 9, 'elder-reach': 10, fennickshaw: 7, hollowmarch: 8, 'juniper-fork': 14, kestrelden: 9, larkmoor: 6, otterstone: 7, 'quillan-flats': 5, skarncliff: 8, thornwether: 4, varrowmere: 3 },
  whitetail: { alderfall: 5, brackwater: 14, coldiron: 2, fennickshaw: 3, hollowmarch: 9, 'juniper-fork': 4, larkmoor: 10, otterstone: 8, 'quillan-flats': 12, thornwether: 9, varrowmere: 13 },
  elk: { alderfall: 9, brackwater: 3, coldiron: 12, 'elder-reach': 14, fennickshaw: 10, hollowmarch: 7, 'juniper-fork': 6, kestrelden: 11, larkmoor: 3, otterstone: 3, skarncliff: 12, thornwether: 6, varrowmere: 2 },
  moose: { alderfall: 10, brackwater: 8, coldiron: 6, 'elder-reach': 7, fennickshaw: 3, hollowmarch: 6, skarncliff: 5, varrowmere: 12 },
  pronghorn: { hollowmarch: 4, 'juniper-fork': 9, kestrelden: 3, larkmoor: 12, otterstone: 10, 'quillan-flats': 18, thornwether: 8, varrowmere: 2 },
  'bighorn-sheep': { alderfall: 3, coldiron: 7, 'elder-reach': 10, fennickshaw: 5, kestrelden: 4, skarncliff: 14 },
  'mountain-goat': { alderfall: 4, coldiron: 6, 'elder-reach': 8, fennickshaw: 3, skarncliff: 12 },
  bison: { hollowmarch: 4, larkmoor: 3, otterstone: 5, 'quillan-flats': 6 },
  'black-bear': { alderfall: 12, brackwater: 9, coldiron: 10, 'elder-reach': 8, fennickshaw: 8, hollowmarch: 5, 'juniper-fork': 3, kestrelden: 6, larkmoor: 2, skarncliff: 9, thornwether: 5, varrowmere: 7 },
  'grizzly-bear': { alderfall: 6, coldiron: 4, 'elder-reach': 5, skarncliff: 8 },
  cougar: { alderfall: 5, brackwater: 3, coldiron: 9, 'elder-reach': 9, fennickshaw: 8, hollowmarch: 4, 'juniper-fork': 9, kestrelden: 10, larkmoor: 4, otterstone: 3, skarncliff: 10, thornwether: 6, varrowmere: 2 },
} as const satisfies Readonly<Record<string, Readonly<Partial<Record<DistrictCode, number>>>>>
export type DemoSpecies = keyof typeof RANGES

/**
 * Districts cut by the line between white-tailed deer of the plains and the small deer of the southern canyons, whose
 * class the society does not offer: an entry from there must say on which side of the river the deer stood.
 */
export const ON_THE_LINE = {
  districts: ['otterstone', 'thornwether'] as readonly DistrictCode[],
  species: 'whitetail', side: 'east', beyond: 'coues', sideBeyond: 'west',
} as const

/** Terms with their minimums in inches; skulls in sixteenths of an inch, the others in eighths. */
export const TERMS = [
  { label: '1962–1987', from_on: '1962-01-01', to_on: '1987-12-31', share: 0.92 },
  { label: '1988–2009', from_on: '1988-01-01', to_on: '2009-12-31', share: 0.96 },
  { label: 'since 2010', from_on: '2010-01-01', to_on: null, share: 1 },
] as const

/** Minimum of the present term in sixteenths of an inch, and how many accepted records the class has. */
export const OFFERED = {
  'mule-deer-typical': { min16: 158 * 16, records: 1130 },
  'mule-deer-nontypical': { min16: 181 * 16, records: 360 },
  'whitetail-typical': { min16: 127 * 16, records: 1040 },
  'whitetail-nontypical': { min16: 149 * 16, records: 330 },
  'elk-typical': { min16: 292 * 16, records: 920 },
  'elk-nontypical': { min16: 317 * 16, records: 160 },
  moose: { min16: 136 * 16, records: 420 },
  pronghorn: { min16: 71 * 16, records: 780 },
  'bighorn-sheep': { min16: 152 * 16, records: 260 },
  'mountain-goat': { min16: 43 * 16 + 8, records: 210 },
  bison: { min16: 97 * 16, records: 120 },
  'black-bear': { min16: 18 * 16 + 3, records: 640 },
  'grizzly-bear': { min16: 20 * 16 + 13, records: 80 },
  cougar: { min16: 13 * 16 + 5, records: 290 },
} as const
export type DemoClass = keyof typeof OFFERED

/** Fees in cents: one for every class, one apart for the classes that need a caliper. */
export const FEES = [
  { version: 1, from_on: '2016-01-01', amount_minor: 3000, skulls_minor: 2500 },
  { version: 2, from_on: '2022-01-01', amount_minor: 4000, skulls_minor: 3000 },
] as const

/** First day on which entries were kept by this program; what is older was taken over from the paper lists. */
export const FIRST_DAY = '2016-01-04'
export const FIRST_YEAR = 1931
export const FOUNDED = 1962

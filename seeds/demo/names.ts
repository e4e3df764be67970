import type { Random } from './random'

/** Given names and name parts made up for the society; a likeness to anybody is chance. */
const GIVEN = [
  'Abren', 'Aldis', 'Anwell', 'Arlo', 'Asta', 'Berrin', 'Bevan', 'Brisa', 'Calder', 'Cassia', 'Corwen', 'Dalla', 'Darrow',
  'Davin', 'Delwyn', 'Edda', 'Ellin', 'Emrys', 'Esker', 'Farris', 'Fenna', 'Finlo', 'Garrick', 'Gwenna', 'Halla', 'Halvar',
  'Hester', 'Ilka', 'Iven', 'Jarrow', 'Jessamy', 'Joss', 'Kellan', 'Kerra', 'Kip', 'Leif', 'Linnet', 'Lorne', 'Lysa',
  'Marrin', 'Merrick', 'Mirel', 'Nessa', 'Norrin', 'Odell', 'Orla', 'Osric', 'Perrin', 'Petra', 'Quillan', 'Rafe', 'Rhosyn',
  'Roan', 'Rook', 'Sabra', 'Senna', 'Sorrel', 'Stellan', 'Tamsin', 'Tavish', 'Torben', 'Ulla', 'Una', 'Varn', 'Vessa',
  'Wendell', 'Wren', 'Wyland', 'Yarrow', 'Ysolde', 'Zora', 'Ørjan', 'Łena', 'Zoë', 'Márta', 'Jürn',
] as const

const FIRST_HALF = [
  'Alder', 'Ash', 'Bell', 'Birch', 'Brack', 'Bram', 'Cold', 'Crag', 'Dun', 'Elder', 'Fenn', 'Flint', 'Gorse', 'Grey', 'Hallow',
  'Harrow', 'Heath', 'Holt', 'Iron', 'Kestrel', 'Lark', 'Linden', 'Marsh', 'Mere', 'Moss', 'North', 'Oak', 'Otter', 'Pike',
  'Quarry', 'Raven', 'Reed', 'Rush', 'Sedge', 'Skarn', 'Slate', 'Sorrel', 'Stone', 'Tarn', 'Thorn', 'Varrow', 'Wether', 'Whin', 'Wold',
] as const
const SECOND_HALF = [
  'acre', 'bank', 'beck', 'born', 'bridge', 'croft', 'dale', 'den', 'field', 'ford', 'gate', 'hurst', 'keld', 'land', 'ley',
  'lock', 'more', 'ridge', 'shaw', 'stead', 'ton', 'wick', 'wood', 'worth', 'yard',
] as const

/** Surnames that no rule makes: short ones, double ones, ones that lists sort and search badly. */
const ODD_SURNAMES = ['O\'Tarnley', 'Van der Wold', 'Skårn', 'Peña-Harrow', 'Li', 'de Brack', 'McVarrow', 'Thörn', 'Hallow-Reed'] as const

const STREETS = ['Tannery', 'Millrace', 'Fold', 'Causeway', 'Depot', 'Hayloft', 'Ferry', 'Saddler', 'Bench', 'Orchard', 'Quarry', 'Lantern'] as const
const KINDS_OF_STREET = ['Lane', 'Road', 'Street', 'Row', 'Way'] as const

export const givenName = (random: Random): string => random.pick(GIVEN)

export function surname(random: Random): string {
  return random.chance(0.03) ? random.pick(ODD_SURNAMES) : random.pick(FIRST_HALF) + random.pick(SECOND_HALF)
}

export function personName(random: Random): string {
  const middle = random.chance(0.25) ? ` ${random.pick(GIVEN).slice(0, 1)}.` : ''
  return `${givenName(random)}${middle} ${surname(random)}`
}

/** An address in a town called after the district; no such street stands anywhere we know of. */
export function address(random: Random, district: string): string {
  return `${random.whole(1, 980)} ${random.pick(STREETS)} ${random.pick(KINDS_OF_STREET)}, ${district}`
}

/** Numbers that the North American plan keeps free for fiction: 555-0100 to 555-0199. */
export const phone = (random: Random): string => `555-01${String(random.whole(0, 99)).padStart(2, '0')}`

/** Ways of taking, the least limiting first; where two were used the earlier one of this list counts. */
export const METHODS = ['rifle', 'shotgun', 'muzzleloader', 'handgun', 'crossbow', 'compound_bow', 'recurve_longbow'] as const

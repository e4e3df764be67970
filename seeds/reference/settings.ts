import { METHODS } from '#shared/domain/workflow/origins'

/**
 * Values every registry begins with. A registry's own name, zone and currency are for its registrar to give; what the
 * workflow counts by (days, quorum, limits) is seeded with the workflow.
 */
export const SETTINGS: Readonly<Record<string, unknown>> = {
  societyName: '',
  regionName: '',
  timeZone: 'UTC',
  currency: 'USD',
  officeEmail: '',
  /** which one-method lists a head taken by a method joins */
  methodLists: Object.fromEntries(METHODS.map(method => [method, [method]])),
}

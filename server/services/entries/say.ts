import { formatSteps, fromSixteenths, type Step } from '../../../shared/domain/measuring/index'

/** A net as it is read aloud, in the steps of its class. */
export function sayNet(net16: number, step: Step): string {
  return formatSteps(fromSixteenths(net16, step), step)
}

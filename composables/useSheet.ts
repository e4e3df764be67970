import type { MaybeRefOrGetter } from 'vue'
import type { Measurements, Say, Score, SheetDefinition, Slip } from '#shared/domain/measuring/index'
import { matchUnmeasured, problemText, readMeasurements, score, slips, slipText } from '#shared/domain/measuring/index'

/** The words of the sheet in the reader's language. */
export function useSay(): Say {
  const { t } = useI18n()
  return (key, params) => (params ? t(key, params) : t(key))
}

/** A slip with its sentence. */
export interface ToldSlip extends Slip { readonly text: string }

/**
 * A sheet while it is written: what can be read of it, what is wrong with the rest, the score so far and its slips, all by
 * the same rules as the server's.
 *
 * @param adjust what is done to the readings before they are scored, such as a split skull's spread that does not count
 */
export function useSheet(
  definition: MaybeRefOrGetter<SheetDefinition>, draft: MaybeRefOrGetter<SheetDraft>, adjust: (definition: SheetDefinition, measurements: Measurements) => Measurements = (_, measurements) => measurements,
) {
  const say = useSay()
  const read = computed(() => readMeasurements(toValue(definition), writtenDraft(toValue(draft))))
  const measurements = computed(() => adjust(toValue(definition), read.value.measurements))
  /** Sentences by path, such as `right.g2`. */
  const problems = computed<Readonly<Record<string, string>>>(() =>
    Object.fromEntries(read.value.problems.map(problem => [problem.path, problemText(say, toValue(definition), problem)])))
  const result = computed<Score>(() => score(toValue(definition), measurements.value))
  /** The net if lines that are measured on one side only were equal on the other; the same as the net once all are measured. */
  const matchedNet = computed(() => score(toValue(definition), matchUnmeasured(toValue(definition), measurements.value)).net)
  const told = computed<readonly ToldSlip[]>(() =>
    slips(toValue(definition), measurements.value).map(slip => ({ ...slip, text: slipText(say, toValue(definition), slip) })))
  return { measurements, problems, result, matchedNet, slips: told, readable: computed(() => read.value.problems.length === 0) }
}

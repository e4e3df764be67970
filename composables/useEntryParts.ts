import { missingFacts, type Method, type Origin, type Sex } from '#shared/domain/workflow/origins'

/** A part of an entry's page: done, waiting for the entrant, or not yet due. */
export interface EntryPart { readonly id: string, readonly state: 'done' | 'open' | 'notYet' }

const PEOPLE: readonly string[] = ['hunter', 'finder', 'owner', 'guide', 'guardian', 'heir', 'club']
const part = (id: string, isDone: boolean): EntryPart => ({ id, state: isDone ? 'done' : 'open' })

/** How far each part of an entry is; facts and people as they are being typed, the rest as it was saved. */
export function useEntryParts(
  entry: Ref<EntryAnswer>, form: EntryFactsForm, statement: Ref<StatementAnswer | null | undefined>, money: Ref<MoneyAnswer | null | undefined>,
) {
  const missing = computed(() => missingFacts({
    origin: form.values.origin as Origin, districtKnown: form.values.district !== '', takenPrecision: form.values.takenOn.length === 10 ? 'day' : form.values.takenOn ? 'year' : 'unknown',
    method: (form.values.method || null) as Method | null, sex: (form.values.sex || null) as Sex | null, guided: form.values.guided === '' ? null : form.values.guided === 'yes',
    people: form.values.people.filter(one => one.name.trim()).map(one => ({ part: one.part, minor: one.isMinor, died: one.diedOn !== '' })),
  }))
  const missingPeople = computed(() => missing.value.filter(name => PEOPLE.includes(name)))
  const factsOpen = computed(() => missing.value.length > missingPeople.value.length || (entry.value.district !== null && entry.value.classLine !== 'allowed'))
  const hasSheet = computed(() => entry.value.sheets.some(sheet => sheet.kind !== 'rough'))
  const signed = computed(() => entry.value.statement.signers.some(signer => entry.value.statement.signedBy.includes(signer)))
  const parts = computed<EntryPart[]>(() => [
    ...(entry.value.requests.length > 0 ? [part('requests', entry.value.requests.every(one => one.answeredAt !== null || one.closedAt !== null))] : []),
    part('facts', !factsOpen.value),
    part('people', missingPeople.value.length === 0),
    part('measurer', hasSheet.value || entry.value.measurer !== null),
    part('papers', entry.value.missingPapers.length === 0),
    ...(statement.value ? [part('statement', signed.value)] : []),
    ...(money.value ? [part('fee', money.value.waived || money.value.openMinor === 0)] : []),
    { id: 'sheets', state: hasSheet.value ? 'done' : 'notYet' },
  ])
  return { missingPeople, parts }
}

import type { Chains } from './chain'
import { addEntry, addPeople, addRecord, addSheet, type Place, type ScoredSheet, type Subject } from './record-rows'
import { FIRST_DAY } from './society'

/** When the paper lists were taken over. */
export const TAKEN_OVER_AT = new Date(`${FIRST_DAY}T17:00:00.000Z`)

export interface TakenOver {
  readonly subject: Subject
  readonly sheet: ScoredSheet
  /** who measured it for the paper lists */
  readonly measurerName: string
  /** null where the sheet is lost */
  readonly sheetId: number | null
  /** its number in the paper lists */
  readonly formerNo: string
  readonly registrar: { readonly userId: number, readonly uid: string }
}

/** A record of the paper lists: one event, a sheet where it was kept, nobody's account. */
export function addTakenOver({ subject, sheet, measurerName, sheetId, formerNo, registrar }: TakenOver, place: Place, chains: Chains): void {
  const { plan } = subject
  addEntry(subject, place, TAKEN_OVER_AT, { net16: sheet.net16, gross16: sheet.gross16, begun_by_user_id: registrar.userId })
  addPeople(subject, place, TAKEN_OVER_AT)
  if (sheetId !== null) {
    addSheet(subject, place, sheet, {
      id: sheetId,
      kind: 'entry',
      measuredOn: plan.measuredOn,
      driedSince: null,
      signedAt: new Date(`${plan.measuredOn}T20:00:00.000Z`),
      measurer: { name: measurerName },
    })
  }
  chains.add(place.rows, { id: subject.entryId, uid: subject.entryUid }, [{
    kind: 'take_over',
    from: null,
    to: 'accepted',
    at: TAKEN_OVER_AT,
    by: registrar,
    args: { batch: 'paper-lists', recordNo: subject.recordNo, formerNo, net16: sheet.net16 },
  }])
  const figures = sheetId === null ? { ...sheet, sheet: null } : sheet
  addRecord(subject, place, figures, new Date(`${plan.acceptedOn}T19:00:00.000Z`), sheetId, formerNo)
}

import type { GuardFailure } from '#shared/domain/workflow/guards'
import type { ClassLineAnswer } from '#shared/domain/workflow/eligibility'
import type { DocumentKind, Method, Origin, Sex, SignerPart } from '#shared/domain/workflow/origins'
import type { State } from '#shared/domain/workflow/states'
import type { NextAct } from '#shared/domain/workflow/transition'
import type { Part } from '#shared/domain/access/stakes'
import type { PrintedAs } from '#shared/domain/lists'
import type { DriedFrom, RequestKind } from '#shared/schemas/entries'

/** A line of `/api/entries`. */
export interface EntryLine {
  readonly id: string
  readonly state: State
  readonly turn: string
  readonly since: string
  readonly dueOn: string | null
  readonly category: string
  readonly district: string | null
  readonly takenOn: string
  readonly net: string | null
  readonly recordNo: number | null
  readonly own: boolean
}

export interface EntryPersonShown {
  readonly id: string
  readonly part: Part
  readonly name: string
  readonly isMinor: boolean
  readonly diedOn: string | null
  readonly isMe: boolean
  readonly address: string | null
  readonly email: string | null
  readonly phone: string | null
  readonly bornOn: string | null
}

export interface EntrySheetShown {
  readonly id: string
  readonly kind: 'entry' | 'panel_a' | 'panel_b' | 'panel_joint' | 'rough'
  readonly number: number
  readonly state: 'open' | 'signed' | 'replaced'
  readonly definition: string
  readonly measurements: Record<string, unknown>
  readonly net: string | null
  readonly measuredOn: string | null
  readonly signedAt: string | null
}

export interface EntryRequestShown {
  readonly id: string
  readonly kind: RequestKind
  readonly text: string
  readonly wants: readonly string[]
  readonly askedAt: string
  readonly answer: string | null
  readonly answeredAt: string | null
  readonly closedAt: string | null
}

/** An entry as `/api/entries/:id` says it to whom it belongs. */
export interface EntryAnswer {
  readonly id: string
  readonly version: number
  readonly state: State
  readonly turn: string
  readonly stateSince: string
  readonly dueOn: string | null
  readonly daysLeft: number | null
  readonly today: string
  readonly as: 'owner' | 'bench' | 'staff'
  readonly onHold: boolean
  readonly category: string
  readonly species: string
  readonly origin: Origin
  readonly originalOrigin: Origin | null
  readonly district: string | null
  readonly districtName: string | null
  readonly districtSide: string | null
  readonly classLine: ClassLineAnswer
  readonly takenOn: string
  readonly method: Method | null
  readonly sex: Sex | null
  readonly guided: boolean | null
  readonly hunterPrintedAs: PrintedAs
  readonly guardianChoseName: boolean
  readonly monthPublic: boolean
  readonly driedSince: string | null
  readonly driedFrom: DriedFrom | null
  readonly dryingDays: number
  readonly measurer: { readonly id: string, readonly name: string } | null
  readonly people: readonly EntryPersonShown[]
  readonly net: string | null
  readonly gross: string | null
  readonly minimum: string | null
  readonly sheets: readonly EntrySheetShown[]
  readonly missingPapers: readonly DocumentKind[]
  readonly statement: { readonly signedBy: readonly SignerPart[], readonly signers: readonly SignerPart[] }
  readonly fee: { readonly due: number, readonly settled: number, readonly waived: boolean } | null
  readonly requests: readonly EntryRequestShown[]
  readonly recordNo: number | null
  readonly submittedAt: string | null
  readonly may: { readonly writeFacts: boolean, readonly writeSheet: boolean }
  readonly next: readonly NextAct[]
}

export interface EntryEventShown {
  readonly seq: number
  readonly at: string
  readonly kind: string
  readonly to: State | null
  readonly by: string | null
  readonly isMine: boolean
  readonly args: Record<string, unknown>
  readonly texts: Record<string, string | null>
}

export interface DocumentAnswer {
  readonly id: string
  readonly kind: DocumentKind
  readonly name: string
  readonly type: 'image' | 'pdf'
  readonly pages: number | null
  readonly size: number
  readonly byViewer: boolean
  readonly uploadedBy: string | null
  readonly createdAt: string
  readonly hasThumbnail: boolean
  readonly changeable: boolean
}

export interface DocumentsAnswer {
  readonly items: readonly DocumentAnswer[]
  readonly wanted: readonly { readonly kind: DocumentKind, readonly there: boolean }[]
  readonly addable: readonly DocumentKind[]
  readonly maxBytes: number
}

export interface MoneyAnswer {
  readonly currency: string | null
  readonly dueMinor: number
  readonly settledMinor: number
  readonly openMinor: number
  readonly waived: boolean
  readonly pay: 'online' | 'office' | null
  readonly openPage: { readonly url: string | null, readonly since: string } | null
  readonly refundingMinor: number
  readonly lines: readonly { readonly id: string, readonly kind: string, readonly amountMinor: number, readonly currency: string, readonly at: string, readonly reason: string | null }[]
  readonly lastTry: 'failed' | 'expired' | 'cancelled' | null
}

export interface StatementAnswer {
  readonly text: { readonly version: number, readonly body: string }
  readonly signers: readonly { readonly part: SignerPart, readonly name: string }[]
  readonly signed: readonly { readonly part: string, readonly name: string, readonly textVersion: number, readonly signedAt: string, readonly stands: boolean }[]
  readonly maySign: boolean
}

/** What of a guard's items is named in the entrant's words. */
export function useEntryWords() {
  const { t, te } = useI18n()
  const words = useDeskWords()
  function guard(failure: GuardFailure): string {
    const key = `entry.guards.${failure.guard}`
    if (!te(key)) return t(`errors.fields.guard_${failure.guard}`)
    const items = (failure.items ?? []).map(item => te(`entry.missing.${item}`) ? t(`entry.missing.${item}`) : te(`names.documents.${item}`) ? t(`names.documents.${item}`) : item)
    return t(key, { items: words.list(items) })
  }
  const asked = (code: string) => te(`names.documents.${code}`) ? t(`names.documents.${code}`) : te(`entry.missing.${code}`) ? t(`entry.missing.${code}`) : te(`entry.facts.${code}`) ? t(`entry.facts.${code}`) : words.category(code)
  return { guard, asked }
}

/** The part of the page where something that stands in the way can be put right. */
export function partOfGuard(failure: GuardFailure): string {
  const people = ['hunter', 'finder', 'owner', 'guide', 'guardian', 'heir']
  switch (failure.guard) {
    case 'animal_facts_complete': return failure.items?.every(item => people.includes(item)) ? 'people' : 'facts'
    case 'class_allowed': return 'facts'
    case 'papers_complete': return 'papers'
    case 'statement_signed': return 'statement'
    case 'fee_settled': return 'fee'
    case 'every_request_answered': return 'requests'
    default: return 'acts'
  }
}

import type { Step, WrittenMeasurements } from '#shared/domain/measuring/index'
import type { Part } from '#shared/domain/access/stakes'
import type { CheckCode } from '#shared/domain/workflow/checks'
import type { DocumentKind, Method, Origin, Sex } from '#shared/domain/workflow/origins'
import type { State, Turn } from '#shared/domain/workflow/states'
import type { NextAct } from '#shared/domain/workflow/transition'

/** As what somebody looks at a file: decides what of it they are shown. */
export type FileViewer = 'measurer' | 'office' | 'judge'

export interface FilePerson {
  readonly id: string
  readonly part: Part
  readonly name: string
  readonly isMinor: boolean
  readonly hasDied: boolean
  readonly hasAccount: boolean
  /** where they can be reached; for the office alone */
  readonly address: string | null
  readonly email: string | null
}

export interface FilePaper {
  readonly id: string
  readonly kind: DocumentKind
  readonly name: string
  readonly mime: string
  /** pictures of it: 1 for a photograph, 0 for a PDF of which none could be made */
  readonly pages: number
  /** whether a scanner looked through it and found nothing */
  readonly scanned: boolean
  readonly uploadedAt: string
}

export interface FileCheck {
  readonly code: CheckCode
  readonly tickedBy: string | null
  /** ISO 8601 in UTC */
  readonly tickedAt: string | null
}

export interface FileRequest {
  readonly id: string
  readonly kind: string
  readonly text: string
  /** kinds of paper, facts or classes that are wanted */
  readonly wants: readonly string[]
  readonly askedBy: string | null
  readonly askedAt: string
  readonly answer: string | null
  readonly answeredAt: string | null
  readonly closedAt: string | null
}

export interface FileSheet {
  readonly id: string
  readonly kind: 'entry' | 'panel_a' | 'panel_b' | 'panel_joint' | 'rough'
  readonly number: number
  readonly definition: string
  readonly state: 'open' | 'signed' | 'replaced'
  readonly version: number
  readonly measurements: WrittenMeasurements
  readonly net: string | null
  readonly gross: string | null
  readonly measuredOn: string | null
  readonly measurer: string | null
  readonly driedSince: string | null
  readonly driedFrom: string | null
  readonly wholeSkull: boolean | null
  /** reasons given for slips, by slip */
  readonly reasons: Readonly<Record<string, string>>
  readonly signedAt: string | null
  /** SHA-256 of what was signed, in hex */
  readonly hash: string | null
  /** why it replaces an earlier one */
  readonly reason: string | null
  readonly isStanding: boolean
}

export interface FileEvent {
  readonly seq: number
  readonly at: string
  readonly kind: string
  readonly to: string | null
  readonly by: string | null
  readonly isMine: boolean
  /** figures and codes of what happened, such as `net16` or `ground` */
  readonly args: Readonly<Record<string, unknown>>
  /** what was written, by field; null where it was erased */
  readonly texts: Readonly<Record<string, string | null>>
}

/** A file as the desk shows it to a measurer, the office or a judge: what they may see, and what they may do next. */
export interface DeskFile {
  readonly id: string
  readonly version: number
  readonly state: State
  readonly turn: Turn
  /** in what its class is measured */
  readonly step: Step
  readonly since: string
  readonly days: number
  readonly dueOn: string | null
  readonly daysLeft: number | null
  readonly returnTo: string | null
  readonly category: string
  readonly definition: string
  readonly species: string
  /** classes with the same lines that the registry offers */
  readonly siblings: readonly string[]
  readonly viewer: {
    readonly as: FileViewer
    /** will measure the animal again, blind to every figure of it */
    readonly isBlind: boolean
    /** barred by a stake: the file stays closed */
    readonly stakes: readonly string[]
    readonly mayReview: boolean
    readonly mayWriteSheet: boolean
  }
  readonly origin: Origin
  readonly originalOrigin: Origin | null
  readonly district: string | null
  readonly districtSide: string | null
  readonly takenOn: string
  readonly method: Method | null
  readonly sex: Sex | null
  readonly guided: boolean | null
  readonly printedAs: 'full' | 'initials' | 'withheld'
  readonly monthPublic: boolean
  readonly net: string | null
  readonly gross: string | null
  readonly minimum: string | null
  readonly hold: { readonly since: string, readonly reason: string } | null
  readonly isAppeal: boolean
  readonly entrant: string | null
  readonly measurer: string | null
  readonly reviewer: { readonly name: string, readonly isMe: boolean } | null
  readonly dryingDays: number
  readonly people: readonly FilePerson[]
  readonly papers: readonly FilePaper[]
  readonly missingPapers: readonly DocumentKind[]
  readonly statement: { readonly signer: string, readonly part: Part, readonly signedAt: string } | null
  readonly checks: readonly FileCheck[]
  readonly requests: readonly FileRequest[]
  readonly sheets: readonly FileSheet[]
  readonly doubles: readonly { readonly id: string, readonly state: State, readonly same: 'sheet' | 'animal' }[]
  readonly secondMeasuring: { readonly due: boolean, readonly done: boolean, readonly askedBy: number } | null
  readonly docket: { readonly itemId: string, readonly sittingId: string | null, readonly heldOn: string | null, readonly place: string | null } | null
  readonly events: readonly FileEvent[]
  readonly next: readonly NextAct[]
  /** the registry's own day */
  readonly today: string
}

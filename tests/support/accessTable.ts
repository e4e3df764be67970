import type { Role } from '../../shared/domain/access/roles'
import { DEER, PASSWORD } from './scene'

/*
 * Who may call what, in one place and apart from the program: a route or page that is missing here, or that lets in
 * somebody else, fails tests/api/access.test.ts.
 */

export type Who = 'anyone' | 'signedIn' | readonly Role[]

const OFFICE = ['reviewer', 'registrar'] as const
const PANEL = ['judge', 'reviewer', 'registrar'] as const
const REGISTRAR = ['registrar'] as const
const REVIEWER = ['reviewer'] as const
const JUDGE = ['judge'] as const

/** Every route by its method and file; what a role lets in is narrowed by party for entries, below. */
export const ROUTES: Readonly<Record<string, Who>> = {
  'ANY /api/auth/[...]': 'anyone',
  'GET /api/health': 'anyone',
  'GET /api/me': 'anyone',
  'GET /api/openapi.json': 'anyone',
  // the account
  'POST /api/account/sign-up': 'anyone',
  'POST /api/account/confirmation': 'anyone',
  'POST /api/account/confirm': 'anyone',
  'POST /api/account/link': 'anyone',
  'POST /api/account/reset-request': 'anyone',
  'POST /api/account/reset': 'anyone',
  'POST /api/account/invitation': 'anyone',
  'GET /api/account': 'signedIn',
  'PATCH /api/account': 'signedIn',
  'POST /api/account/email': 'signedIn',
  'POST /api/account/password': 'signedIn',
  'POST /api/account/second-factor': 'signedIn',
  'POST /api/account/second-factor/enable': 'signedIn',
  'POST /api/account/second-factor/codes': 'signedIn',
  'POST /api/account/second-factor/remove': 'signedIn',
  'GET /api/account/sessions': 'signedIn',
  'DELETE /api/account/sessions': 'signedIn',
  'DELETE /api/account/sessions/[id]': 'signedIn',
  // people
  'GET /api/people': REGISTRAR,
  'GET /api/people/[id]': REGISTRAR,
  'POST /api/people/invitations': REGISTRAR,
  'POST /api/people/[id]/invitation': REGISTRAR,
  'POST /api/people/[id]/roles': REGISTRAR,
  'POST /api/people/[id]/roles/[role]/end': REGISTRAR,
  'POST /api/people/[id]/accreditations': REGISTRAR,
  'PATCH /api/people/accreditations/[id]': REGISTRAR,
  'POST /api/people/proposals/[id]/decision': REGISTRAR,
  // the public room
  'GET /api/categories': 'anyone',
  'GET /api/measurers': 'anyone',
  'POST /api/scores': 'anyone',
  'GET /api/records': 'anyone',
  'GET /api/records.csv': 'anyone',
  'GET /api/records/facets': 'anyone',
  'GET /api/records/[recordNo]': 'anyone',
  'GET /api/records/[recordNo]/drawing': 'anyone',
  'POST /api/records/[recordNo]/reports': 'signedIn',
  'GET /api/mailbox': 'anyone',
  'GET /api/mailbox/[id]': 'anyone',
  'POST /api/payments/webhook': 'anyone',
  // the desk
  'GET /api/desk': 'signedIn',
  'GET /api/desk/files/[id]': ['measurer', 'reviewer', 'judge', 'registrar'],
  'GET /api/bench': ['measurer', 'shop'],
  'GET /api/office/queue': OFFICE,
  // entries
  'GET /api/entries': 'signedIn',
  'POST /api/entries': 'signedIn',
  'POST /api/entries/for': ['measurer', 'shop'],
  'POST /api/entries/claim': 'signedIn',
  'GET /api/entries/[id]': 'signedIn',
  'PATCH /api/entries/[id]': 'signedIn',
  'PUT /api/entries/[id]/sheet': 'signedIn',
  'GET /api/entries/[id]/events': 'signedIn',
  'POST /api/entries/[id]/transitions': 'signedIn',
  'GET /api/entries/[id]/statement': 'signedIn',
  'POST /api/entries/[id]/statement': 'signedIn',
  'GET /api/entries/[id]/money': 'signedIn',
  'POST /api/entries/[id]/money': OFFICE,
  'POST /api/entries/[id]/checkout': 'signedIn',
  'GET /api/entries/[id]/documents': 'signedIn',
  'POST /api/entries/[id]/documents': 'signedIn',
  'PUT /api/entries/[id]/documents/order': 'signedIn',
  'PATCH /api/documents/[id]': 'signedIn',
  'DELETE /api/documents/[id]': 'signedIn',
  'GET /api/documents/[id]/original': 'signedIn',
  'GET /api/documents/[id]/picture': 'signedIn',
  'GET /api/documents/[id]/thumbnail': 'signedIn',
  'POST /api/entries/[id]/challenge-answer': 'signedIn',
  'POST /api/entries/[id]/clearances': REGISTRAR,
  'POST /api/entries/[id]/declarations': ['shop', 'measurer', 'reviewer', 'judge', 'registrar'],
  // the office
  'PUT /api/entries/[id]/checks/[check]': REVIEWER,
  'DELETE /api/entries/[id]/checks/[check]': REVIEWER,
  'POST /api/entries/[id]/requests': REVIEWER,
  'PATCH /api/entries/[id]/requests/[request]': REVIEWER,
  'DELETE /api/entries/[id]/requests/[request]': REVIEWER,
  'POST /api/entries/[id]/requests/[request]/close': REVIEWER,
  'POST /api/entries/[id]/requests/[request]/answer': 'signedIn',
  'POST /api/challenges/[id]/check': REVIEWER,
  // the panel
  'GET /api/panel': PANEL,
  'GET /api/panel/sittings/[id]': PANEL,
  'POST /api/sittings': OFFICE,
  'POST /api/sittings/[id]/docket': PANEL,
  'POST /api/sittings/[id]/judges': PANEL,
  'POST /api/sittings/[id]/open': JUDGE,
  'POST /api/sittings/[id]/close': JUDGE,
  'PUT /api/sittings/[id]/items/[item]/ballot': JUDGE,
  'PUT /api/sittings/[id]/items/[item]/pair': JUDGE,
  'POST /api/sittings/[id]/items/[item]/second-measuring': JUDGE,
  'GET /api/entries/[id]/second-measuring': JUDGE,
  'PUT /api/entries/[id]/panel-sheet': JUDGE,
  'POST /api/entries/[id]/panel-sheet/sign': JUDGE,
  'PUT /api/entries/[id]/joint-sheet': JUDGE,
  'POST /api/entries/[id]/joint-sheet/sign': JUDGE,
}

/** Every page by its file. */
export const PAGES: Readonly<Record<string, Who>> = {
  '/': 'anyone',
  '/sign-in': 'anyone',
  '/sign-up': 'anyone',
  '/confirm': 'anyone',
  '/reset': 'anyone',
  '/invite': 'anyone',
  '/measure': 'anyone',
  '/measure/[category]': 'anyone',
  '/measurers': 'anyone',
  '/records': 'anyone',
  '/records/[recordNo]': 'anyone',
  '/mailbox': 'anyone',
  '/account': 'signedIn',
  '/desk': 'signedIn',
  '/desk/entries': 'signedIn',
  '/desk/entries/new': 'signedIn',
  '/desk/entries/[id]': 'signedIn',
  '/claim': 'signedIn',
  '/desk/bench': ['measurer', 'shop'],
  '/desk/bench/[id]': ['measurer'],
  '/desk/office': OFFICE,
  '/desk/office/[id]': OFFICE,
  '/desk/panel': PANEL,
  '/desk/panel/new': OFFICE,
  '/desk/panel/[sitting]': PANEL,
  '/desk/panel/[sitting]/[entry]': JUDGE,
  '/desk/panel/[sitting]/minutes': PANEL,
  '/desk/registrar/people': REGISTRAR,
  '/desk/registrar/people/[id]': REGISTRAR,
}

/** People as they stand to one entry. Each holds the role that comes with it, and no other. */
export const PARTIES = [
  'visitor', 'owner', 'stranger', 'shop', 'assignedMeasurer', 'otherMeasurer', 'reviewer', 'registrar', 'chair', 'judge', 'judgeElsewhere',
  /** holds every role, sits in the sitting, and guided the hunter */
  'staked',
] as const
export type Party = (typeof PARTIES)[number]

export interface Asked { readonly entry: string, readonly sitting: string, readonly item: string, readonly request: string, readonly document: string, readonly version: number }
export interface PartyRow {
  /** key of ROUTES */
  readonly route: string
  readonly stage: 'draft' | 'measuring' | 'certified' | 'in_review' | 'at_panel'
  /** more than the route, where one has several acts */
  readonly act?: string
  readonly query?: string
  /** code by which this route keeps out those who may see the entry but not do this */
  readonly refusal?: string
  readonly sittingOpen?: boolean
  readonly body?: (asked: Asked) => object
  readonly headers?: (asked: Asked) => Readonly<Record<string, string>>
  /** who is let in; whoever else hears 401, 403 or 404 */
  readonly may: readonly Party[]
}

const SEES_IN_REVIEW: readonly Party[] = ['owner', 'assignedMeasurer', 'reviewer', 'registrar']
const STALE = () => ({ 'if-match': '"9999"' })
const move = (transition: string, more: (asked: Asked) => object = () => ({})) => ({
  route: 'POST /api/entries/[id]/transitions', act: transition, body: (asked: Asked) => ({ transition, version: asked.version, ...more(asked) }),
})

/** Routes whose answer depends on how somebody stands to the entry: owner, other, one with a stake. */
export const PARTY_ROWS: readonly PartyRow[] = [
  { route: 'GET /api/entries/[id]', stage: 'draft', may: ['owner', 'registrar'] },
  { route: 'GET /api/entries/[id]', stage: 'measuring', may: ['owner', 'assignedMeasurer', 'registrar'] },
  { route: 'GET /api/entries/[id]', stage: 'in_review', may: SEES_IN_REVIEW },
  { route: 'GET /api/entries/[id]', stage: 'at_panel', may: [...SEES_IN_REVIEW, 'chair', 'judge'] },
  { route: 'GET /api/entries/[id]/events', stage: 'in_review', may: SEES_IN_REVIEW },
  { route: 'GET /api/entries/[id]/statement', stage: 'in_review', may: SEES_IN_REVIEW },
  { route: 'GET /api/entries/[id]/documents', stage: 'in_review', may: ['owner', 'assignedMeasurer', 'reviewer', 'registrar'] },
  { route: 'GET /api/entries/[id]/money', stage: 'certified', may: ['owner', 'reviewer', 'registrar'] },
  { route: 'GET /api/entries/[id]/money', stage: 'in_review', may: ['owner', 'reviewer', 'registrar'] },
  // With a stake the desk tells the head of the file and why it is closed; tests/api/access.test.ts holds that nothing else is in it.
  { route: 'GET /api/desk/files/[id]', act: 'as=measurer', stage: 'measuring', query: '?as=measurer', may: ['assignedMeasurer'] },
  { route: 'GET /api/desk/files/[id]', act: 'as=office', stage: 'in_review', query: '?as=office', may: ['reviewer', 'registrar', 'staked'] },
  { route: 'GET /api/desk/files/[id]', act: 'as=judge', stage: 'at_panel', query: '?as=judge', may: ['chair', 'judge', 'staked'] },
  { route: 'PATCH /api/entries/[id]', stage: 'draft', body: () => ({ sex: 'female' }), headers: STALE, may: ['owner'] },
  { route: 'PATCH /api/entries/[id]', stage: 'measuring', body: () => ({ sex: 'female' }), headers: STALE, may: ['owner'] },
  { route: 'PUT /api/entries/[id]/sheet', stage: 'measuring', body: () => ({ measurements: DEER }), headers: STALE, may: ['assignedMeasurer'] },
  { route: 'POST /api/entries/[id]/statement', stage: 'certified', body: () => ({ part: 'hunter', name: 'Nobody of that name', textVersion: 1 }), may: ['owner'] },
  { route: 'POST /api/entries/[id]/money', stage: 'in_review', body: () => ({ kind: 'refund', reason: 'Asked for' }), may: ['reviewer', 'registrar'] },
  { route: 'PUT /api/entries/[id]/checks/[check]', stage: 'in_review', may: ['reviewer'] },
  { route: 'DELETE /api/entries/[id]/checks/[check]', stage: 'in_review', may: ['reviewer'] },
  { route: 'POST /api/entries/[id]/requests', stage: 'in_review', body: () => ({ kind: 'explain', text: 'Where did it hang?' }), may: ['reviewer'] },
  { route: 'PATCH /api/documents/[id]', stage: 'certified', body: () => ({ kind: 'other' }), refusal: 'file_settled', may: ['owner'] },
  { route: 'DELETE /api/documents/[id]', stage: 'certified', refusal: 'file_settled', may: ['owner'] },
  { route: 'POST /api/entries/[id]/declarations', stage: 'in_review', body: () => ({ kind: 'other' }), may: ['assignedMeasurer', 'reviewer', 'registrar', 'staked'] },
  { route: 'GET /api/panel/sittings/[id]', stage: 'at_panel', may: ['chair', 'judge', 'reviewer', 'registrar', 'staked'] },
  { route: 'POST /api/sittings/[id]/open', stage: 'at_panel', body: () => ({}), may: ['chair'] },
  { route: 'PUT /api/sittings/[id]/items/[item]/ballot', stage: 'at_panel', sittingOpen: true, body: () => ({ vote: 'accept' }), may: ['chair', 'judge'] },
  { route: 'POST /api/sittings/[id]/items/[item]/second-measuring', stage: 'at_panel', body: () => ({ reason: 'To be sure' }), may: ['chair', 'judge'] },
  { ...move('ask_measurer'), stage: 'draft', may: ['owner'] },
  { ...move('certify', () => ({ password: PASSWORD })), stage: 'measuring', may: ['assignedMeasurer'] },
  { ...move('hand_back', () => ({ comment: 'Not mine' })), stage: 'measuring', may: ['assignedMeasurer'] },
  { ...move('submit'), stage: 'certified', may: ['owner'] },
  { ...move('return', () => ({ comment: 'More' })), stage: 'in_review', may: ['reviewer'] },
  { ...move('put_before_panel'), stage: 'in_review', may: ['reviewer'] },
  { ...move('decline_ineligible', () => ({ ground: 'altered_parts' })), stage: 'in_review', may: ['reviewer'] },
  { ...move('withdraw'), stage: 'in_review', may: ['owner'] },
  { ...move('order_remeasure'), stage: 'at_panel', may: ['chair'] },
]

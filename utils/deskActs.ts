/** Choices that an act's form offers and that the act itself does not carry. */
export interface ActExtras {
  /** grounds that the entry's facts do not contradict */
  readonly grounds?: readonly string[]
  /** classes with the same lines */
  readonly categories?: readonly string[]
  readonly sittings?: readonly { readonly id: string, readonly label: string }[]
  readonly judges?: readonly { readonly id: string, readonly name: string }[]
  readonly measurers?: readonly { readonly id: string, readonly name: string }[]
  /** reports on the record that the office has checked */
  readonly challenges?: readonly { readonly id: string, readonly label: string }[]
  /** said above the form, such as that a second measuring is due */
  readonly notes?: Readonly<Record<string, string>>
}

/** Acts that end or undo something: they ask once more before they are sent. */
export const GRAVE_ACTS: readonly string[] = ['decline_ineligible', 'withdraw', 'challenge', 'hand_back', 'not_presented']

import type { Role } from '../domain/access/roles'

/** Who may open a page. The server decides again at every route; this spares a reader a page that would be empty. */
export type PageAccess = 'public' | 'signedIn' | readonly Role[]

declare module '#app' {
  interface PageMeta {
    access?: PageAccess
    /** `desk`: the page speaks the desk's words although it stands in another layout. */
    texts?: 'desk'
    /** The desk gives the page the whole width: papers stand beside the data. */
    wide?: boolean
  }
}

export {}

declare module '#nitro-internal-virtual/server-handlers' {
  import type { EventHandler } from 'h3'

  /** The routes of the build, as Nitro hands them to its own router; a lazy one is the import of its module. */
  export const handlers: readonly { readonly route?: string, readonly method?: string, readonly lazy?: boolean, readonly handler: EventHandler | (() => Promise<{ default: EventHandler }>) }[]
}

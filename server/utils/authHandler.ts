import { AsyncLocalStorage } from 'node:async_hooks'
import { getCookie, getRequestHeader, setCookie, setResponseHeader, setResponseStatus, type EventHandler, type H3Event } from 'h3'
import type { AuthOptions } from 'next-auth'
import CredentialsModule from 'next-auth/providers/credentials'
import { NuxtAuthHandler } from '#auth'
import type { DomainError } from '../../shared/errors'
import { isDomainError } from '../../shared/errors'
import type { Registry } from '../composition'
import { findActor, signOut, LONGEST_MS } from '../services/people/sessions'
import { signIn } from '../services/people/signIn'
import { clientAddress } from './clientAddress'
import { asDomainError } from './failures'
import { cookieName, cookieOptions, isSecure } from './sessionCookie'

/** The package is CommonJS: as a bundle sees it the function stands under `default`, as Node sees it it may be itself. */
const Credentials = (CredentialsModule as unknown as { default?: typeof CredentialsModule }).default ?? CredentialsModule

const DEVICE_DAYS = 180

interface Call {
  readonly event: H3Event
  /** why signing in was refused, if it was */
  refusal?: DomainError
}

/** The request that is being handled; the sign-in package passes none on to its callbacks. */
const calls = new AsyncLocalStorage<Call>()

function currentCall(): Call {
  const call = calls.getStore()
  if (!call) throw new Error('signing in outside a request')
  return call
}

const text = (value: unknown): string => (typeof value === 'string' ? value : '')

async function authorize(fields: Record<string, unknown> | undefined) {
  const call = currentCall()
  const { event } = call
  const { registry } = event.context
  try {
    const device = cookieName(registry.config, 'device')
    const signedIn = await signIn(registry, {
      email: text(fields?.email),
      password: text(fields?.password).slice(0, 1000),
      code: text(fields?.code).slice(0, 40),
      address: clientAddress(event),
      userAgent: getRequestHeader(event, 'user-agent') ?? null,
      device: getCookie(event, device) ?? null,
    })
    if (signedIn.device) setCookie(event, device, signedIn.device, { ...cookieOptions(registry.config), maxAge: DEVICE_DAYS * 86_400 })
    return { id: signedIn.sid }
  }
  catch (error) {
    call.refusal = asDomainError(event, error)
    throw new Error(call.refusal.details.reason === 'wrong' ? 'second_factor_wrong' : call.refusal.code, { cause: error })
  }
}

function optionsFor(registry: Registry): AuthOptions {
  const { config } = registry
  const options = cookieOptions(config)
  return {
    secret: config.secret,
    providers: [Credentials({
      name: 'Hartroll',
      credentials: { email: { type: 'email' }, password: { type: 'password' }, code: { type: 'text' } },
      authorize,
    })],
    session: { strategy: 'jwt', maxAge: LONGEST_MS / 1000 },
    useSecureCookies: isSecure(config),
    cookies: {
      sessionToken: { name: cookieName(config, 'session'), options },
      csrfToken: { name: cookieName(config, 'csrf'), options },
      callbackUrl: { name: cookieName(config, 'callback'), options },
    },
    pages: { signIn: '/sign-in', error: '/sign-in', signOut: '/' },
    callbacks: {
      /** The token carries the session's id and nothing else. */
      async jwt({ token, user }) {
        if (user) return { sid: user.id }
        const { registry } = currentCall().event.context
        if (typeof token.sid !== 'string' || !await findActor(registry, token.sid)) throw new Error('the session has ended')
        return { sid: token.sid }
      },
      async session({ session, token }) {
        const actor = await findActor(currentCall().event.context.registry, String(token.sid))
        return { expires: session.expires, user: { name: actor?.name ?? null, email: actor?.email ?? null } }
      },
      redirect: ({ url, baseUrl }) => (url.startsWith('/') && !url.startsWith('//') && !url.startsWith('/\\') ? url : new URL(url, baseUrl).origin === new URL(baseUrl).origin ? url : '/'),
    },
    events: {
      async signOut({ token }) {
        if (typeof token?.sid === 'string') await signOut(currentCall().event.context.registry, token.sid)
      },
    },
    logger: {
      // An ended session is everyday's business; what we refuse is told to who asks.
      error: (code, details) => registry.log.debug({ code, err: details }, 'sign-in'),
      warn: code => registry.log.debug({ code }, 'sign-in'),
      debug: () => {},
    },
  }
}

let handler: EventHandler | undefined

/**
 * Hands a request to the sign-in package. Its handler can be made once a process, so it is made for the registry of the
 * first request; a second registry in one installation would need one per host here.
 */
export async function handleAuth(event: H3Event): Promise<unknown> {
  const { registry } = event.context
  handler ??= NuxtAuthHandler(optionsFor(registry)) as EventHandler
  const made = handler
  const call: Call = { event }
  const answer = await calls.run(call, async () => made(event))
  if (isDomainError(call.refusal)) {
    setResponseStatus(event, call.refusal.status)
    if (typeof call.refusal.details.retryAfter === 'number') setResponseHeader(event, 'retry-after', call.refusal.details.retryAfter)
  }
  return answer
}

import { createHash, timingSafeEqual } from 'node:crypto'
import type { IncomingMessage, ServerResponse } from 'node:http'
import { Messenger } from './messenger'
import { controlPage, PAGE_STYLE, payPage } from './page'
import { PaymentsService, ServiceError, type Faults, type Form } from './service'

export interface StandInOptions {
  /** Where it keeps its things. */
  readonly folder: string
  readonly secretKey: string
  readonly webhookSecret: string
  /** Where our side takes messages. */
  readonly webhookUrl: string
  /** Where its pages are, without a slash at the end, e.g. `http://127.0.0.1:3000/pay`. */
  readonly pageBase: string
}

const MAX_BODY = 64 * 1024
const styleHash = `'sha256-${createHash('sha256').update(PAGE_STYLE).digest('base64')}'`
const SECURITY = `default-src 'none'; img-src 'self'; style-src ${styleHash}; form-action 'self'; frame-ancestors 'none'; base-uri 'none'`

async function readForm(request: IncomingMessage): Promise<Form> {
  const chunks: Buffer[] = []
  let size = 0
  for await (const chunk of request) {
    size += (chunk as Buffer).length
    if (size > MAX_BODY) throw new ServiceError(413, 'invalid_request_error', 'The request is too large.')
    chunks.push(chunk as Buffer)
  }
  return Object.fromEntries(new URLSearchParams(Buffer.concat(chunks).toString('utf8')))
}

function answerJson(response: ServerResponse, status: number, body: unknown): void {
  response.writeHead(status, { 'content-type': 'application/json', 'request-id': `req_${Date.now().toString(36)}` }).end(JSON.stringify(body))
}

function answerPage(response: ServerResponse, html: string, status = 200): void {
  response.writeHead(status, { 'content-type': 'text/html; charset=utf-8', 'cache-control': 'no-store', 'content-security-policy': SECURITY }).end(html)
}

const goTo = (response: ServerResponse, to: string) => response.writeHead(303, { location: to, 'cache-control': 'no-store' }).end()

/**
 * A stand-in of the payments service for one machine: its API under `/v1`, its pages under `/pay`, and its signed
 * messages. Only the demo and the tests start it.
 */
export class PaymentsStandIn {
  readonly service: PaymentsService
  readonly messenger: Messenger
  readonly #options: StandInOptions

  constructor(options: StandInOptions) {
    this.#options = options
    this.messenger = new Messenger(options.webhookUrl, options.webhookSecret)
    this.service = new PaymentsService(options.folder, options.pageBase, message => this.messenger.send(message))
    this.messenger.attach(this.service)
  }

  close(): void {
    this.messenger.close()
  }

  /** Answers a request whose path begins with `/v1/` or `/pay`. */
  async handle(request: IncomingMessage, response: ServerResponse): Promise<void> {
    const { pathname, searchParams } = new URL(request.url ?? '/', 'http://stand-in')
    const api = pathname.startsWith('/v1/')
    try {
      if (api) await this.#api(request, response, pathname)
      else await this.#pages(request, response, pathname, searchParams)
    }
    catch (error) {
      const refusal = error instanceof ServiceError ? error : new ServiceError(500, 'api_error', 'The stand-in failed.')
      if (api) answerJson(response, refusal.status, { error: { type: refusal.type, message: refusal.message, ...(refusal.code ? { code: refusal.code } : {}) } })
      else response.writeHead(refusal.status, { 'content-type': 'text/plain; charset=utf-8' }).end(refusal.message)
    }
  }

  async #api(request: IncomingMessage, response: ServerResponse, pathname: string): Promise<void> {
    const form = await readForm(request)
    if (this.service.faults().outage) throw new ServiceError(503, 'api_error', 'The service is out of order.')
    const given = Buffer.from(request.headers.authorization ?? '')
    const wanted = Buffer.from(`Bearer ${this.#options.secretKey}`)
    if (given.length !== wanted.length || !timingSafeEqual(given, wanted)) throw new ServiceError(401, 'invalid_request_error', 'The key is not known.')
    const key = request.headers['idempotency-key'] as string | undefined
    const what = `${request.method} ${pathname}`
    const session = /^\/v1\/checkout\/sessions\/(\w+)(\/expire)?$/.exec(pathname)
    if (what === 'POST /v1/checkout/sessions') return answerJson(response, 200, this.service.once(key, what, form, () => this.service.createSession(form)))
    if (what === 'POST /v1/refunds') return answerJson(response, 200, this.service.once(key, what, form, () => this.service.refund(form)))
    if (session && request.method === 'POST' && session[2]) return answerJson(response, 200, this.service.once(key, what, form, () => this.service.expireSession(session[1]!)))
    if (session && request.method === 'GET' && !session[2]) return answerJson(response, 200, this.service.session(session[1]!))
    throw new ServiceError(404, 'invalid_request_error', `There is nothing at ${pathname}.`)
  }

  async #pages(request: IncomingMessage, response: ServerResponse, pathname: string, query: URLSearchParams): Promise<void> {
    const id = /^\/pay\/(\w+)$/.exec(pathname)?.[1]
    if (request.method === 'GET') {
      if (id) return answerPage(response, payPage(this.service.session(id), query.has('declined')))
      if (pathname === '/pay') return answerPage(response, controlPage(this.service.store.list('sessions'), this.service.faults()))
    }
    else if (request.method === 'POST') {
      const form = await readForm(request)
      if (id) return this.#choose(response, id, form.card)
      if (pathname === '/pay') {
        const known = this.service.faults()
        const wished = Object.fromEntries(Object.entries(form).filter(([name]) => name in known).map(([name, value]) => [name, value === 'true'])) as Partial<Faults>
        this.service.setFaults(wished)
        if (wished.silent === false) this.messenger.resume()
        goTo(response, '/pay')
        return
      }
    }
    throw new ServiceError(404, 'invalid_request_error', 'There is nothing at this address.')
  }

  #choose(response: ServerResponse, id: string, card: string | undefined): void {
    const session = this.service.session(id)
    switch (card) {
      case 'taken':
        this.service.pay(id)
        goTo(response, session.success_url)
        return
      case 'declined':
        this.service.decline(id)
        goTo(response, `/pay/${id}?declined`)
        return
      case 'expired':
        if (session.status === 'open') this.service.expireSession(id)
        goTo(response, session.cancel_url)
        return
      default:
        goTo(response, session.cancel_url)
    }
  }
}

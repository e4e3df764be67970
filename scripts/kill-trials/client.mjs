import { sleep } from '../lib/processes.mjs'

/**
 * @typedef {{ status: number, body: any, headers: Headers }} Answer
 * @typedef {object} Load
 * @property {string} name
 * @property {(stop: AbortSignal) => Promise<void>} work until told to stop
 * @property {(databaseUrl: string) => Promise<{ answered: number, problems: string[] }>} verify
 */

const LIMIT_MS = 15_000
const PASSWORD = 'ochre-basin-demo'

/** A person's browser, as far as the load needs one: cookies and JSON. */
export class Client {
  /** @type {Map<string, string>} */
  #cookies = new Map()
  #url

  /** @param {string} url */
  constructor(url) {
    this.#url = url
  }

  /**
   * @param {string} method
   * @param {string} path
   * @param {{ json?: unknown, form?: Record<string, string>, headers?: Record<string, string> }} [options]
   * @returns {Promise<Answer>} rejects when no answer came
   */
  async send(method, path, { json, form, headers = {} } = {}) {
    const answer = await fetch(new URL(path, this.#url), {
      method,
      redirect: 'manual',
      signal: AbortSignal.timeout(LIMIT_MS),
      headers: {
        cookie: [...this.#cookies].map(([name, value]) => `${name}=${value}`).join('; '),
        ...(json === undefined ? {} : { 'content-type': 'application/json' }),
        ...headers,
      },
      body: json === undefined ? form && new URLSearchParams(form) : JSON.stringify(json),
    })
    for (const cookie of answer.headers.getSetCookie()) {
      const [, name = '', value = ''] = /^([^=]+)=([^;]*)/.exec(cookie) ?? []
      this.#cookies.set(name, value)
    }
    const text = await answer.text()
    return { status: answer.status, headers: answer.headers, body: /json/.test(answer.headers.get('content-type') ?? '') ? JSON.parse(text) : text }
  }

  /**
   * Signs in, waiting where too many have tried at once.
   *
   * @param {string} account of the demo, such as `judge1`
   */
  async signIn(account) {
    for (let attempt = 1; ; attempt++) {
      const { body: { csrfToken } } = await this.send('GET', '/api/auth/csrf')
      const answer = await this.send('POST', '/api/auth/callback/credentials', {
        form: { csrfToken, email: `${account}@ochrebasin.example`, password: PASSWORD, json: 'true' },
      })
      const me = await this.send('GET', '/api/me')
      if (me.status === 200 && me.body.email === `${account}@ochrebasin.example`) return this
      if (answer.status !== 429 || attempt === 10) throw new Error(`${account} could not sign in: ${answer.status} ${JSON.stringify(answer.body)}`)
      await sleep(1_000 * attempt)
    }
  }
}

/** @param {Answer | null} answer */
export const is2xx = answer => answer !== null && answer.status >= 200 && answer.status < 300

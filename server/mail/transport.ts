import { createTransport } from 'nodemailer'

export interface Message {
  readonly from: { readonly name: string, readonly address: string }
  readonly to: string
  readonly subject: string
  readonly text: string
  readonly html: string
  /** The same for every attempt, so that a program that got a message twice can tell. */
  readonly messageId: string
}

/** Why a message was not taken. */
export class MailFailure extends Error {
  /** `server`: nothing can be sent at present; `message`: this one is refused, others may go. */
  readonly kind: 'server' | 'message'

  constructor(kind: 'server' | 'message', message: string) {
    super(message)
    this.name = 'MailFailure'
    this.kind = kind
  }
}

export interface MailTransport {
  /** @throws MailFailure */
  send(message: Message): Promise<void>
  close(): Promise<void>
}

/** Errors of nodemailer that are about one message, not about the server. */
const ABOUT_THE_MESSAGE = new Set(['EENVELOPE', 'EMESSAGE'])

/**
 * Sends through a mail server.
 *
 * @param url smtp:// or smtps://, with user and password where the server wants them
 */
export function smtpTransport(url: string): MailTransport {
  const transport = createTransport({ url, pool: true, maxConnections: 2, connectionTimeout: 10_000, greetingTimeout: 10_000, socketTimeout: 30_000 })
  return {
    async send({ from, to, subject, text, html, messageId }) {
      try {
        await transport.sendMail({
          from,
          to: { name: '', address: to },
          subject,
          text,
          html,
          messageId,
          // RFC 3834: no automatic answers to automatic messages.
          headers: { 'Auto-Submitted': 'auto-generated' },
          disableFileAccess: true,
          disableUrlAccess: true,
        })
      }
      catch (error) {
        const { code, message } = error as Error & { code?: string }
        throw new MailFailure(ABOUT_THE_MESSAGE.has(code ?? '') ? 'message' : 'server', message)
      }
    },
    async close() {
      transport.close()
    },
  }
}

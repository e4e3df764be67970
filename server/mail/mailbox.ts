import { mkdirSync } from 'node:fs'
import { readdir, readFile, rename, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import type { AddressInfo } from 'node:net'
import { simpleParser } from 'mailparser'
import { SMTPServer } from 'smtp-server'
import { smtpTransport, type MailTransport } from './transport'

/**
 * The demo's stand-in for a mail server: a real one on loopback that takes every message over SMTP and keeps it as a
 * file, one a message. The name of the file is its id, and sorts by time.
 */
export async function localMailbox(folder: string): Promise<MailTransport> {
  mkdirSync(folder, { recursive: true, mode: 0o700 })
  let taken = 0
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['AUTH', 'STARTTLS'],
    size: 10 * 2 ** 20,
    onData(stream, _session, done) {
      const parts: Buffer[] = []
      stream.on('data', (part: Buffer) => parts.push(part))
      stream.on('end', () => {
        const id = `${Date.now().toString().padStart(15, '0')}-${process.pid}-${++taken}`
        const unfinished = join(folder, `.${id}`)
        writeFile(unfinished, Buffer.concat(parts), { mode: 0o600 })
          .then(() => rename(unfinished, join(folder, `${id}.eml`)))
          .then(() => done(), done)
      })
    },
  })
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject)
    server.listen(0, '127.0.0.1', resolve)
  })
  server.on('error', () => {})
  const { port } = server.server.address() as AddressInfo
  const transport = smtpTransport(`smtp://127.0.0.1:${port}`)
  return {
    send: message => transport.send(message),
    async close() {
      await transport.close()
      await new Promise<void>(resolve => server.close(() => resolve()))
    },
  }
}

export interface KeptMessage {
  readonly id: string
  /** ISO 8601 */
  readonly at: string
  readonly to: string
  readonly subject: string
}

export interface OpenedMessage extends KeptMessage {
  readonly from: string
  readonly text: string
  readonly html: string
}

const FILE = /^(\d{15})-\d+-\d+\.eml$/

/** The newest messages first. @param limit how many at most */
export async function listMailbox(folder: string, limit: number): Promise<KeptMessage[]> {
  const names = (await readdir(folder).catch(() => [])).filter(name => FILE.test(name)).sort().reverse().slice(0, limit)
  return Promise.all(names.map(async name => kept(await open(folder, name))))
}

/** One message, or null when there is none of that id. */
export async function readMailbox(folder: string, id: string): Promise<OpenedMessage | null> {
  const name = `${id}.eml`
  if (!FILE.test(name)) return null
  return open(folder, name).catch((error: NodeJS.ErrnoException) => {
    if (error.code === 'ENOENT') return null
    throw error
  })
}

async function open(folder: string, name: string): Promise<OpenedMessage> {
  const message = await simpleParser(await readFile(join(folder, name)))
  const to = Array.isArray(message.to) ? message.to : message.to ? [message.to] : []
  return {
    id: name.replace(/\.eml$/, ''),
    at: new Date(Number(FILE.exec(name)![1])).toISOString(),
    to: to.map(address => address.text).join(', '),
    from: message.from?.text ?? '',
    subject: message.subject ?? '',
    text: message.text ?? '',
    html: message.html || '',
  }
}

function kept({ id, at, to, subject }: OpenedMessage): KeptMessage {
  return { id, at, to, subject }
}

import { createReadStream } from 'node:fs'
import { connect, type Socket } from 'node:net'
import { once } from 'node:events'

const TIMEOUT_MS = 30_000

/** Looks for harmful content in a file before it is kept. */
export interface Scanner {
  /** @returns false when something was found. Throws when the scanner does not answer. */
  isClean(file: string): Promise<boolean>
}

function dial(address: URL): Socket {
  return address.protocol === 'unix:' ? connect({ path: address.pathname }) : connect({ host: address.hostname, port: Number(address.port || 3310) })
}

/**
 * A client of clamd by its INSTREAM command (clamd(8), "zINSTREAM": chunks behind their length in four bytes, network
 * order, ended by a length of nothing). Null without an address: then files are marked as not scanned.
 */
export function openScanner(address: string | null): Scanner | null {
  if (!address) return null
  const url = new URL(address)
  return {
    async isClean(file) {
      const socket = dial(url)
      socket.setTimeout(TIMEOUT_MS, () => socket.destroy(new Error('the scanner does not answer')))
      try {
        await once(socket, 'connect')
        const answer = collect(socket)
        socket.write('zINSTREAM\0')
        for await (const chunk of createReadStream(file, { highWaterMark: 64 * 1024 })) {
          const length = Buffer.alloc(4)
          length.writeUInt32BE((chunk as Buffer).length)
          socket.write(length)
          if (!socket.write(chunk)) await once(socket, 'drain')
        }
        socket.write(Buffer.alloc(4))
        const said = (await answer).replace(/\0/g, '').trim()
        if (said.endsWith('OK')) return true
        if (said.endsWith('FOUND')) return false
        throw new Error(`the scanner said: ${said.slice(0, 100)}`)
      }
      finally {
        socket.destroy()
      }
    },
  }
}

async function collect(socket: Socket): Promise<string> {
  let text = ''
  for await (const chunk of socket) text += String(chunk)
  return text
}

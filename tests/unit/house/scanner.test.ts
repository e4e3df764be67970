import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { createServer, type Server, type Socket } from 'node:net'
import { once } from 'node:events'
import os from 'node:os'
import path from 'node:path'
import { afterEach, beforeEach, expect, it } from 'vitest'
import { openScanner } from '../../../server/storage/scanner'

let folder: string
let server: Server
let received: Buffer
beforeEach(() => { folder = mkdtempSync(path.join(os.tmpdir(), 'hartroll-scanner-')) })
afterEach(() => {
  server?.close()
  rmSync(folder, { recursive: true, force: true })
})

/** A scanner that reads the INSTREAM command as clamd(8) has it, and says what `say` makes of the file. */
async function scanner(say: (file: Buffer, socket: Socket) => string | null, at: string | number = 0) {
  server = createServer((socket) => {
    let bytes = Buffer.alloc(0)
    socket.on('error', () => {})
    socket.on('data', (chunk) => {
      bytes = Buffer.concat([bytes, chunk])
      const parts: Buffer[] = []
      for (let place = 'zINSTREAM\0'.length; place + 4 <= bytes.length;) {
        const length = bytes.readUInt32BE(place)
        if (length === 0) {
          received = Buffer.concat(parts)
          const said = say(received, socket)
          if (said !== null) socket.end(`${said}\0`)
          return
        }
        parts.push(bytes.subarray(place + 4, place + 4 + length))
        place += 4 + length
      }
    })
  })
  server.listen(at as number, ...typeof at === 'number' ? ['127.0.0.1'] : [])
  await once(server, 'listening')
  const address = server.address()
  return openScanner(typeof address === 'string' ? `unix:${address}` : `tcp://127.0.0.1:${address!.port}`)!
}
function file(bytes: Buffer | string): string {
  writeFileSync(path.join(folder, 'file'), bytes)
  return path.join(folder, 'file')
}
/** Not the test file that scanners know, so that no scanner of this machine stumbles over it. */
const BAD = 'something harmful'
const judge = (bytes: Buffer) => bytes.includes(BAD) ? 'stream: Some-Threat FOUND' : 'stream: OK'

it('is none without an address', () => {
  expect(openScanner(null)).toBeNull()
})

it('is sent the whole file in chunks and says whether it is clean', async () => {
  const looks = await scanner(judge)
  const long = Buffer.alloc(300_000, 'paper ')
  expect(await looks.isClean(file(long))).toBe(true)
  expect(received.equals(long)).toBe(true)
  expect(await looks.isClean(file(`a paper with ${BAD} in it`))).toBe(false)
  expect(await looks.isClean(file(''))).toBe(true)
})

it('can be behind a socket file', async () => {
  const looks = await scanner(judge, path.join(folder, 'clamd.sock'))
  expect(await looks.isClean(file(BAD))).toBe(false)
})

it.each([
  ['says something else', () => 'INSTREAM size limit exceeded. ERROR', /size limit/],
  ['hangs up', (_file: Buffer, socket: Socket) => { socket.destroy(); return null }, /scanner|ECONNRESET|closed/],
] as const)('that %s has not said that a file is clean', async (_what, say, reason) => {
  const looks = await scanner(say)
  await expect(looks.isClean(file('a paper'))).rejects.toThrow(reason)
})

it('that is not there has not said so either', async () => {
  await expect(openScanner('tcp://127.0.0.1:1')!.isClean(file('a paper'))).rejects.toThrow(/ECONNREFUSED/)
})

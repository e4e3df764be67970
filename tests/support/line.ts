import net from 'node:net'

export interface DatabaseLine {
  /** as in DATABASE_URL, through the line */
  readonly url: string
  /** Refuses new connections and breaks those that are open. */
  cut(): Promise<void>
  mend(): Promise<void>
  close(): Promise<void>
}

/** A line between a program and a database server that can be cut and mended, so that the server itself can stay. */
export async function openLine(databaseUrl: string): Promise<DatabaseLine> {
  const target = new URL(databaseUrl)
  const open = new Set<net.Socket>()
  const server = net.createServer((near) => {
    const far = net.connect(Number(target.port), target.hostname)
    for (const [one, other] of [[near, far], [far, near]] as const) {
      open.add(one)
      one.pipe(other)
      one.on('error', () => {})
      one.on('close', () => {
        open.delete(one)
        other.destroy()
      })
    }
  })
  const listen = (port: number) => new Promise<void>((resolve, reject) => {
    server.once('error', reject)
    server.listen(port, '127.0.0.1', () => resolve())
  })
  await listen(0)
  const { port } = server.address() as net.AddressInfo
  const cut = async () => {
    const closed = new Promise<void>(resolve => server.close(() => resolve()))
    for (const socket of open) socket.destroy()
    await closed
  }
  const url = new URL(databaseUrl)
  url.port = String(port)
  return {
    url: url.href,
    cut,
    mend: () => listen(port),
    close: async () => {
      if (server.listening) await cut()
    },
  }
}

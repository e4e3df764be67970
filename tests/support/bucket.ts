import { createHash, createHmac } from 'node:crypto'
import { once } from 'node:events'
import { createServer, type IncomingMessage, type ServerResponse } from 'node:http'
import type { AddressInfo } from 'node:net'

const ACCESS_KEY = 'test-access-key'
const SECRET_KEY = 'a secret key of the tests alone'
const REGION = 'eu-test-1'
const BUCKET = 'papers'

/** What the bucket does instead of answering: a status with the service's own code, no answer at all, or half a file. */
export type BucketFault = { readonly status: number, readonly code: string } | 'silent' | 'half'

export interface TestBucket {
  /** Settings under which Hartroll uses it. */
  readonly env: Readonly<Record<string, string>>
  readonly objects: Map<string, { bytes: Buffer, type: string | undefined, at: Date }>
  /** Method and key of every request that came, in order. */
  readonly requests: string[]
  /** How many answers are under way. */
  answering(): number
  /** Faults of the next requests, the first first; the last one stays while `lasting`. */
  fail(fault: BucketFault, lasting?: boolean): void
  mend(): void
  close(): Promise<void>
}

/**
 * A bucket in this process that speaks as much of the S3 REST API as storing papers needs: PutObject, GetObject,
 * HeadObject, DeleteObject and ListObjectsV2, in path style, with requests signed by AWS Signature Version 4. Written from
 * memory of the published API; the AWS SDK on the other side is what holds it to it. Like many servers that are not
 * Amazon's it knows no bodies in signed chunks.
 */
export async function openBucket({ pageSize = 1000 } = {}): Promise<TestBucket> {
  const objects: TestBucket['objects'] = new Map()
  const requests: string[] = []
  let faults: BucketFault[] = []
  let lasts = false
  let answering = 0
  const server = createServer((request, response) => {
    answering++
    response.once('close', () => { answering-- })
    answer(request, response).catch((error: unknown) => {
      if (!response.headersSent) refuse(response, 500, 'InternalError', String(error))
    })
  })

  async function answer(request: IncomingMessage, response: ServerResponse): Promise<void> {
    const url = new URL(request.url!, 'http://bucket')
    const [, bucket, ...rest] = url.pathname.split('/')
    const key = rest.map(decodeURIComponent).join('/')
    requests.push(`${request.method} ${key}`)
    const chunks: Buffer[] = []
    for await (const chunk of request) chunks.push(chunk as Buffer)
    const bytes = Buffer.concat(chunks)
    const fault = lasts ? faults[0] : faults.shift()
    if (fault === 'silent') return
    if (fault && fault !== 'half') return refuse(response, fault.status, fault.code, 'As wished')
    if (signatureOf(request, url) !== /Signature=(\w+)/.exec(request.headers.authorization ?? '')?.[1]) return refuse(response, 403, 'SignatureDoesNotMatch', 'The signature does not match')
    if (bucket !== BUCKET) return refuse(response, 404, 'NoSuchBucket', 'There is no such bucket')
    if (key === '') return list(url.searchParams, response)
    if (request.method === 'PUT') return put(key, bytes, request, response)
    const found = objects.get(key)
    if (request.method === 'DELETE') {
      objects.delete(key)
      response.writeHead(204).end()
      return
    }
    if (!found) return refuse(response, 404, 'NoSuchKey', 'There is no such key')
    response.writeHead(200, { 'content-length': found.bytes.length, 'content-type': found.type ?? 'binary/octet-stream', 'last-modified': found.at.toUTCString(), etag: etagOf(found.bytes) })
    if (request.method === 'HEAD') response.end()
    else if (fault === 'half') response.write(found.bytes.subarray(0, found.bytes.length / 2), () => response.destroy())
    else response.end(found.bytes)
  }

  function put(key: string, bytes: Buffer, { headers }: IncomingMessage, response: ServerResponse): void {
    if (/aws-chunked/.test(headers['content-encoding'] ?? '')) return refuse(response, 501, 'NotImplemented', 'Bodies in chunks are not known here')
    const sum = headers['x-amz-checksum-sha256']
    if (sum !== undefined && sum !== createHash('sha256').update(bytes).digest('base64')) return refuse(response, 400, 'BadDigest', 'The checksum does not match')
    objects.set(key, { bytes, type: headers['content-type'], at: new Date() })
    response.writeHead(200, { etag: etagOf(bytes) }).end()
  }

  function list(query: URLSearchParams, response: ServerResponse): void {
    const after = query.get('continuation-token') ?? ''
    const keys = [...objects.keys()].sort().filter(key => key > after && key.startsWith(query.get('prefix') ?? ''))
    const page = keys.slice(0, Math.min(pageSize, Number(query.get('max-keys') ?? pageSize)))
    const more = page.length < keys.length ? `<NextContinuationToken>${page.at(-1)}</NextContinuationToken>` : ''
    const lines = page.map(key => `<Contents><Key>${key}</Key><LastModified>${objects.get(key)!.at.toISOString()}</LastModified><Size>${objects.get(key)!.bytes.length}</Size></Contents>`)
    xml(response, 200, `<ListBucketResult><Name>${BUCKET}</Name><KeyCount>${page.length}</KeyCount><IsTruncated>${more !== ''}</IsTruncated>${more}${lines.join('')}</ListBucketResult>`)
  }

  server.listen(0, '127.0.0.1')
  await once(server, 'listening')
  return {
    env: {
      DOCUMENTS_S3_BUCKET: BUCKET, DOCUMENTS_S3_ENDPOINT: `http://127.0.0.1:${(server.address() as AddressInfo).port}`, DOCUMENTS_S3_REGION: REGION,
      DOCUMENTS_S3_ACCESS_KEY_ID: ACCESS_KEY, DOCUMENTS_S3_SECRET_ACCESS_KEY: SECRET_KEY,
    },
    objects,
    requests,
    answering: () => answering,
    fail: (fault, lasting = false) => {
      faults = lasting ? [fault] : [...faults, fault]
      lasts = lasting
    },
    mend: () => {
      faults = []
      lasts = false
    },
    close: async () => {
      server.closeAllConnections()
      server.close()
      await once(server, 'close')
    },
  }
}

const etagOf = (bytes: Buffer) => `"${createHash('md5').update(bytes).digest('hex')}"`

function xml(response: ServerResponse, status: number, body: string): void {
  response.writeHead(status, { 'content-type': 'application/xml' }).end(`<?xml version="1.0" encoding="UTF-8"?>${body}`)
}

function refuse(response: ServerResponse, status: number, code: string, message: string): void {
  xml(response, status, `<Error><Code>${code}</Code><Message>${message}</Message></Error>`)
}

/** The signature that a request of ours has by AWS Signature Version 4 (published by Amazon; from memory). */
function signatureOf({ method, headers }: IncomingMessage, url: URL): string {
  const signed = /SignedHeaders=([^,]+)/.exec(headers.authorization ?? '')?.[1]?.split(';') ?? []
  const encode = (text: string) => encodeURIComponent(text).replace(/[!'()*]/g, sign => `%${sign.charCodeAt(0).toString(16).toUpperCase()}`)
  const query = [...url.searchParams].map(([name, value]) => `${encode(name)}=${encode(value)}`).sort().join('&')
  const lines = signed.map(name => `${name}:${String(headers[name] ?? '').trim()}\n`).join('')
  const canonical = [method, url.pathname, query, lines, signed.join(';'), headers['x-amz-content-sha256']].join('\n')
  const at = String(headers['x-amz-date'])
  const scope = `${at.slice(0, 8)}/${REGION}/s3/aws4_request`
  const key = scope.split('/').reduce<Buffer | string>((secret, part) => createHmac('sha256', secret).update(part).digest(), `AWS4${SECRET_KEY}`)
  return createHmac('sha256', key).update(['AWS4-HMAC-SHA256', at, scope, createHash('sha256').update(canonical).digest('hex')].join('\n')).digest('hex')
}

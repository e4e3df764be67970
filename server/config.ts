import { createHmac } from 'node:crypto'
import { join, resolve } from 'node:path'

/** Everything that the environment decides, checked once at the start. */
export interface HartrollConfig {
  readonly mode: 'demo' | 'production'
  /** Absolute folder for what this machine keeps. */
  readonly dataDir: string
  readonly databaseUrl: string
  /** True when the database server was made by the start script, so that demo data may go into it. */
  readonly ownDatabase: boolean
  readonly secret: string
  /** Origin that every link is made from, without a slash at the end. */
  readonly publicUrl: string
  readonly trustedProxies: number
  /** Short id of this installation; it keeps cookies of two copies on one host apart. */
  readonly instance: string
  readonly smtpUrl: string | null
  readonly stripe: {
    readonly secretKey: string
    readonly webhookSecret: string
    /** Where the service is, when it is not the real one. */
    readonly apiBase: string | null
    /** True in a demo without keys: the web serves a local stand-in of the service beside itself. */
    readonly standIn: boolean
  } | null
  readonly s3: { readonly endpoint: string, readonly bucket: string, readonly region: string, readonly accessKeyId: string, readonly secretAccessKey: string } | null
  /** Moves the clock and loosens limits for tests; refused in production. */
  readonly testing: boolean
  /** Address of clamd, `tcp://host:port` or `unix:/path`; null where uploads are not scanned. */
  readonly scannerUrl: string | null
}

/** A value of the environment that cannot be used; its message is one line for the person who started Hartroll. */
export class ConfigError extends Error {
  constructor(message: string) {
    super(message)
    this.name = 'ConfigError'
  }
}

type Env = Readonly<Record<string, string | undefined>>

function url(env: Env, name: string, protocols: readonly string[]): URL | null {
  const value = env[name]
  if (!value) return null
  let parsed: URL
  try {
    parsed = new URL(value)
  }
  catch {
    throw new ConfigError(`${name} is not a URL.`)
  }
  if (!protocols.includes(parsed.protocol)) throw new ConfigError(`${name} must begin with ${protocols.map(p => `${p}//`).join(' or ')}.`)
  return parsed
}

function required(env: Env, name: string, why: string): string {
  const value = env[name]
  if (!value) throw new ConfigError(`${name} is missing: ${why}.`)
  return value
}

/** Keys by which web and worker of one demo know their stand-in; they follow from the secret, so nothing has to be kept. */
function standInKeys(secret: string, env: Env): HartrollConfig['stripe'] {
  const derive = (what: string) => createHmac('sha256', secret).update(`payments stand-in ${what}`).digest('hex')
  const host = !env.HOST || env.HOST === '0.0.0.0' || env.HOST === '::' ? '127.0.0.1' : env.HOST.includes(':') ? `[${env.HOST}]` : env.HOST
  return { secretKey: `sk_test_${derive('key')}`, webhookSecret: `whsec_${derive('webhook')}`, apiBase: `http://${host}:${env.PORT ?? '3000'}`, standIn: true }
}

/**
 * Reads the environment of contract.md, "Running it".
 *
 * @throws ConfigError with one line that names the variable
 */
export function readConfig(env: Env): HartrollConfig {
  const loopback = !env.HOST || ['127.0.0.1', 'localhost', '::1'].includes(env.HOST)
  const ownDatabase = env.HARTROLL_OWN_DATABASE === '1'
  const mode = env.HARTROLL_MODE ?? (loopback && (ownDatabase || !env.DATABASE_URL) ? 'demo' : 'production')
  if (mode !== 'demo' && mode !== 'production') throw new ConfigError('HARTROLL_MODE must be demo or production.')
  const testing = env.HARTROLL_TESTING === '1'
  if (testing && mode === 'production') throw new ConfigError('HARTROLL_TESTING cannot be used in production.')
  const database = url(env, 'DATABASE_URL', ['mysql:', 'mariadb:'])
  if (!database) throw new ConfigError('DATABASE_URL is missing: npm start makes a database of its own and sets it.')
  const secret = required(env, 'HARTROLL_SECRET', 'sessions and second factors are sealed with it; take 32 random bytes or more')
  if (secret.length < 32) throw new ConfigError('HARTROLL_SECRET is too short: take 32 characters or more.')
  const publicUrl = url(env, 'HARTROLL_PUBLIC_URL', ['http:', 'https:'])
    ?? new URL(`http://${env.HOST && loopback ? env.HOST : '127.0.0.1'}:${env.PORT ?? '3000'}`)
  const proxies = Number(env.HARTROLL_TRUSTED_PROXIES ?? '0')
  if (!Number.isInteger(proxies) || proxies < 0 || proxies > 10) throw new ConfigError('HARTROLL_TRUSTED_PROXIES must be a whole number from 0 to 10.')
  const smtp = url(env, 'SMTP_URL', ['smtp:', 'smtps:'])
  const stripe = env.STRIPE_SECRET_KEY
    ? {
        secretKey: env.STRIPE_SECRET_KEY,
        webhookSecret: required(env, 'STRIPE_WEBHOOK_SECRET', 'messages of the payments service are checked with it'),
        apiBase: url(env, 'STRIPE_API_BASE', ['http:', 'https:'])?.origin ?? null,
        standIn: false,
      }
    : mode === 'demo' ? standInKeys(secret, env) : null
  const s3 = env.DOCUMENTS_S3_BUCKET
    ? {
        bucket: env.DOCUMENTS_S3_BUCKET,
        endpoint: required({ DOCUMENTS_S3_ENDPOINT: url(env, 'DOCUMENTS_S3_ENDPOINT', ['http:', 'https:'])?.href }, 'DOCUMENTS_S3_ENDPOINT', 'DOCUMENTS_S3_BUCKET is set'),
        region: env.DOCUMENTS_S3_REGION ?? 'us-east-1',
        accessKeyId: required(env, 'DOCUMENTS_S3_ACCESS_KEY_ID', 'DOCUMENTS_S3_BUCKET is set'),
        secretAccessKey: required(env, 'DOCUMENTS_S3_SECRET_ACCESS_KEY', 'DOCUMENTS_S3_BUCKET is set'),
      }
    : null
  const dataDir = resolve(env.HARTROLL_DATA ?? '.data')
  return {
    mode,
    dataDir,
    databaseUrl: database.href,
    ownDatabase,
    secret,
    publicUrl: publicUrl.href.replace(/\/$/, ''),
    trustedProxies: proxies,
    instance: (env.HARTROLL_INSTANCE ?? publicUrl.port ?? '').replace(/[^a-z0-9]/gi, '').slice(0, 16) || 'main',
    smtpUrl: smtp?.href ?? null,
    stripe,
    s3,
    testing,
    scannerUrl: url(env, 'HARTROLL_SCANNER', ['tcp:', 'unix:'])?.href ?? null,
  }
}

/** The folder of stored files on the embedded default of one machine. */
export function filesDir(config: HartrollConfig): string {
  return join(config.dataDir, 'files')
}

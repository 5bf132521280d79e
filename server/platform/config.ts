import { randomBytes } from 'node:crypto'
import path from 'node:path'
import type { z } from 'zod'
import { environmentSchema, examples, type EnvironmentName } from './config-variables.ts'
import { isLoopback } from './loopback.ts'

export type ProcessKind = 'api' | 'worker' | 'cli'

/** Wrong or missing environment variables, each named with what is wrong and an example. */
export class ConfigError extends Error {
  readonly faults: { variable: string; detail: string }[]

  constructor(faults: { variable: string; detail: string }[]) {
    super(
      'The configuration does not hold; nothing was started.\n' +
        faults.map(({ variable, detail }) => `  ${variable}: ${detail}`).join('\n'),
    )
    this.name = 'ConfigError'
    this.faults = faults
  }
}

type Values = z.output<typeof environmentSchema>

/**
 * Parses the environment for one kind of process. Throws ConfigError with every fault at once.
 * In a worker the values kept from it are random or unreachable placeholders, whatever the environment holds.
 */
export function readConfig(environment: Record<string, string | undefined>, kind: ProcessKind = 'api') {
  const parsed = environmentSchema.safeParse(
    kind === 'worker' ? { ...environment, ...placeholders() } : environment,
  )
  if (!parsed.success) throw new ConfigError(parsed.error.issues.map((issue) => fault(issue, environment)))
  const values = parsed.data
  const faults = [...missingDatabases(values, kind), ...unsafe(values)]
  if (faults.length > 0) throw new ConfigError(faults)
  return shaped(values, environment.NODE_ENV)
}

export type Config = ReturnType<typeof readConfig>

/** What a worker is never given (threat B9): it gets values in their place that open nothing. */
function placeholders(): Partial<Record<EnvironmentName, string>> {
  const nothing = () => randomBytes(32).toString('base64url')
  const nowhere = 'http://127.0.0.1:1/'
  return {
    DATABASE_URL: 'postgres://nobody@127.0.0.1:1/none',
    SESSION_SECRET: nothing(),
    HALFSILVER_SECRET: nothing(),
    OAUTH_CLIENT_ID: 'none',
    OAUTH_CLIENT_SECRET: nothing(),
    OAUTH_AUTHORIZE_URL: nowhere,
    OAUTH_TOKEN_URL: nowhere,
    OAUTH_PROFILE_URL: nowhere,
    OAUTH_EMAILS_URL: nowhere,
    SMTP_URL: 'smtp://127.0.0.1:1',
    TSA_URL: nowhere,
    TSA_CHAIN_FILE: 'none',
  }
}

function fault(issue: z.core.$ZodIssue, environment: Record<string, string | undefined>) {
  const variable = String(issue.path[0] ?? 'environment')
  const example = examples[variable as EnvironmentName]
  const found =
    environment[variable] === undefined || environment[variable] === '' ? 'is missing' : issue.message
  return { variable, detail: `${found}${example ? `; an example: ${variable}=${example}` : ''}` }
}

function missingDatabases(values: Values, kind: ProcessKind) {
  const faults = []
  if (kind === 'cli' && !values.DATABASE_OWNER_URL)
    faults.push({
      variable: 'DATABASE_OWNER_URL',
      detail: `is missing; migrations need the owner, for example ${examples.DATABASE_OWNER_URL}`,
    })
  if (kind === 'worker' && !values.DATABASE_WORKER_URL)
    faults.push({
      variable: 'DATABASE_WORKER_URL',
      detail: `is missing; a worker connects under its own role, for example ${examples.DATABASE_WORKER_URL}`,
    })
  return faults
}

/** Rulings 21 and 23: no plain http off loopback, and no demonstration where a real service or a real address is. */
function unsafe(values: Values) {
  const origin = new URL(values.PUBLIC_ORIGIN)
  const faults = []
  if (origin.protocol === 'http:' && !isLoopback(origin.hostname))
    faults.push({
      variable: 'PUBLIC_ORIGIN',
      detail: `is ${values.PUBLIC_ORIGIN}, plain http beyond this machine; signing needs TLS, for example https://notebook.example.org`,
    })
  if (!values.HALFSILVER_DEMO) return faults
  if (!isLoopback(origin.hostname))
    faults.push({
      variable: 'HALFSILVER_DEMO',
      detail: 'is set, but PUBLIC_ORIGIN is not on loopback; leave it out',
    })
  for (const name of [
    'DATABASE_URL',
    'STORAGE_ENDPOINT',
    'OAUTH_AUTHORIZE_URL',
    'OAUTH_TOKEN_URL',
    'SMTP_URL',
    'TSA_URL',
  ] as const)
    if (!isLoopback(new URL(values[name]).hostname))
      faults.push({
        variable: 'HALFSILVER_DEMO',
        detail: `is set, but ${name} names an outside service; a demonstration runs with the local stand-ins alone`,
      })
  return faults
}

function shaped(values: Values, environment: string | undefined) {
  const origin = new URL(values.PUBLIC_ORIGIN).origin
  return {
    production: environment === 'production',
    port: values.PORT,
    dataFolder: path.resolve(values.HALFSILVER_DATA),
    /** Scheme, host and port as a browser sees the product. */
    origin,
    database: {
      app: values.DATABASE_URL,
      owner: values.DATABASE_OWNER_URL,
      worker: values.DATABASE_WORKER_URL,
    },
    sessionSecret: values.SESSION_SECRET,
    /** Wraps at rest what must not be readable from a dump of the database (threat B7). */
    secret: values.HALFSILVER_SECRET,
    storage: {
      endpoint: values.STORAGE_ENDPOINT,
      accessKey: values.STORAGE_ACCESS_KEY,
      secretKey: values.STORAGE_SECRET_KEY,
      region: values.STORAGE_REGION,
      bucket: values.STORAGE_BUCKET,
    },
    oauth: {
      clientId: values.OAUTH_CLIENT_ID,
      clientSecret: values.OAUTH_CLIENT_SECRET,
      authorizeUrl: values.OAUTH_AUTHORIZE_URL,
      tokenUrl: values.OAUTH_TOKEN_URL,
      profileUrl: values.OAUTH_PROFILE_URL,
      emailsUrl: values.OAUTH_EMAILS_URL,
    },
    mail: { smtpUrl: values.SMTP_URL, from: values.MAIL_FROM },
    timeStamps: {
      url: values.TSA_URL,
      chainFile: values.TSA_CHAIN_FILE,
      independent: values.TSA_INDEPENDENT,
    },
    laboratory: { name: values.LABORATORY_NAME, zone: values.LABORATORY_ZONE },
    maxUploadBytes: values.MAX_UPLOAD_BYTES,
    demo: values.HALFSILVER_DEMO,
  }
}

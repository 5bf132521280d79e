import path from 'node:path'

/** Groups of variables; one group given from outside replaces the stand-in that serves it otherwise. */
const outside = {
  database: 'DATABASE_URL',
  storage: 'STORAGE_ENDPOINT',
  'code-host': 'OAUTH_AUTHORIZE_URL',
  mail: 'SMTP_URL',
  stamps: 'TSA_URL',
}

/** Names of the services that stand-ins serve in this environment. */
export function standIns(environment) {
  return Object.keys(outside).filter((name) => !environment[outside[name]])
}

/** A demonstration only when nothing from outside takes part (ruling 23). */
export function isDemo(environment) {
  const loopback =
    !environment.PUBLIC_ORIGIN || /^http:\/\/127\.0\.0\.1(:\d+)?$/.test(environment.PUBLIC_ORIGIN)
  return loopback && standIns(environment).length === Object.keys(outside).length
}

/** The environment of the product's processes: what was given, completed by what the stand-ins offer. */
export function productEnvironment({ environment, port, dataFolder, secrets, database, ports, demo }) {
  const local = new Set(standIns(environment))
  const codeHost = `http://127.0.0.1:${ports.codeHost}`
  return {
    ...environment,
    PORT: String(port),
    HALFSILVER_DATA: dataFolder,
    PUBLIC_ORIGIN: environment.PUBLIC_ORIGIN ?? `http://127.0.0.1:${port}`,
    SESSION_SECRET: environment.SESSION_SECRET ?? secrets.session,
    HALFSILVER_SECRET: environment.HALFSILVER_SECRET ?? secrets.atRest,
    LABORATORY_NAME: environment.LABORATORY_NAME ?? (demo ? 'Ridgeway Photonics Laboratory' : 'Laboratory'),
    HALFSILVER_DEMO: demo ? '1' : '0',
    ...(local.has('database') && {
      DATABASE_URL: database.app,
      DATABASE_OWNER_URL: database.owner,
      DATABASE_WORKER_URL: database.worker,
    }),
    ...(local.has('storage') && {
      STORAGE_ENDPOINT: `http://127.0.0.1:${ports.storage}`,
      STORAGE_ACCESS_KEY: 'halfsilver',
      STORAGE_SECRET_KEY: secrets.storage,
      STORAGE_REGION: 'us-east-1',
      STORAGE_BUCKET: 'halfsilver',
    }),
    ...(local.has('code-host') && {
      OAUTH_CLIENT_ID: 'halfsilver',
      OAUTH_CLIENT_SECRET: secrets.oauth,
      OAUTH_AUTHORIZE_URL: `${codeHost}/login/oauth/authorize`,
      OAUTH_TOKEN_URL: `${codeHost}/login/oauth/access_token`,
      OAUTH_PROFILE_URL: `${codeHost}/user`,
      OAUTH_EMAILS_URL: `${codeHost}/user/emails`,
    }),
    ...(local.has('mail') && {
      SMTP_URL: `smtp://127.0.0.1:${ports.smtp}`,
      MAIL_FROM: 'Ridgeway notebook <notebook@ridgeway.example>',
    }),
    ...(local.has('stamps') && {
      TSA_URL: `http://127.0.0.1:${ports.stamps}/`,
      TSA_CHAIN_FILE: path.join(dataFolder, 'fakes/stamps/tsa-chain.pem'),
      TSA_INDEPENDENT: '0',
    }),
  }
}

/** What a worker is never given: the secrets and the database of the application (threat B9). */
const keptFromWorkers = [
  'DATABASE_URL',
  'DATABASE_OWNER_URL',
  'SESSION_SECRET',
  'HALFSILVER_SECRET',
  'OAUTH_CLIENT_SECRET',
  'SMTP_URL',
]

export function workerEnvironment(environment) {
  return Object.fromEntries(Object.entries(environment).filter(([name]) => !keptFromWorkers.includes(name)))
}

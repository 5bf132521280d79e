import type { Request, RequestHandler, Response } from 'express'
import session from 'express-session'
import connectPgSimple from 'connect-pg-simple'
import pg from 'pg'
import type { Config } from '../config.ts'
import { personActor, type Actor } from '../http/actor.ts'
import type { Services } from '../services.ts'

declare module 'express-session' {
  interface SessionData {
    personId: string
    /** ISO times of the sign-in and of the last activity of the person. */
    startedAt: string
    activeAt: string
    returnTo: string
  }
}

/** However active somebody is, after this a session ends. */
const SESSION_HOURS = 12
/** Without a sign of the person for this long a session ends. */
const IDLE_MINUTES = 30

/** The port is in the name because cookies ignore ports: two copies side by side would sign each other out. */
function sessionCookieName(port: number): string {
  return `__Host-hs-${port}`
}

export interface SessionStore {
  middleware: RequestHandler
  close(): Promise<void>
}

/** Sessions in PostgreSQL; the browser holds a signed random id and nothing else. */
export function openSessions(config: Config): SessionStore {
  const pool = new pg.Pool({
    connectionString: config.database.app,
    max: 5,
    application_name: 'halfsilver sessions',
  })
  const Store = connectPgSimple(session)
  const store = new Store({
    pool,
    schemaName: 'session',
    tableName: 'sessions',
    ttl: SESSION_HOURS * 3600,
    disableTouch: true,
  })
  const middleware = session({
    name: sessionCookieName(config.port),
    secret: config.sessionSecret,
    store,
    resave: false,
    saveUninitialized: false,
    // Only https or loopback is ever served (config.ts), and browsers take Secure cookies from both: every request is
    // marked as https for the middleware, which otherwise sends no Secure cookie over plain http.
    proxy: true,
    cookie: { secure: true, httpOnly: true, sameSite: 'lax', path: '/' },
  })
  return {
    middleware: (req, res, next) => {
      req.headers['x-forwarded-proto'] = 'https'
      middleware(req, res, next)
    },
    async close() {
      store.close()
      await pool.end()
    },
  }
}

/** Starts a session under a new id, so that an id known before the sign-in is worth nothing. */
export async function startSession(req: Request, personId: string, now: Date): Promise<void> {
  await new Promise<void>((done, fail) =>
    req.session.regenerate((error: unknown) => (error ? fail(asError(error)) : done())),
  )
  Object.assign(req.session, { personId, startedAt: now.toISOString(), activeAt: now.toISOString() })
}

/** Ends the session of this request and takes the cookie back. */
export async function endSession(req: Request, res: Response, config: Config): Promise<void> {
  await new Promise<void>((done, fail) =>
    req.session.destroy((error: unknown) => (error ? fail(asError(error)) : done())),
  )
  res.clearCookie(sessionCookieName(config.port), {
    secure: true,
    httpOnly: true,
    sameSite: 'lax',
    path: '/',
  })
}

/** The person of the request's session while it lasts; notes activity. */
export async function sessionActor(services: Services, req: Request): Promise<Actor | null> {
  // Requests outside /api and /auth have no session at all.
  const current = req.session as session.Session & Partial<session.SessionData>
  if (!current?.personId || !current.startedAt || !current.activeAt) return null
  const now = services.clock.now()
  if (hasEnded(current.startedAt, current.activeAt, now)) {
    await new Promise<void>((done) => current.destroy(() => done()))
    return null
  }
  const actor = await personActor(services.db, current.personId, req.sessionID)
  if (actor && isActivity(req)) await noteActivity(services, req, now)
  return actor
}

function hasEnded(startedAt: string, activeAt: string, now: Date): boolean {
  return now.getTime() >= endsAt(startedAt).getTime() || now.getTime() > idleEndsAt(activeAt).getTime()
}

function endsAt(startedAt: string): Date {
  return new Date(Date.parse(startedAt) + SESSION_HOURS * 3_600_000)
}

function idleEndsAt(activeAt: string): Date {
  return new Date(Date.parse(activeAt) + IDLE_MINUTES * 60_000)
}

/** When the session of this request ends; of a token's request, nothing. */
export function sessionEnds(req: Request): { endsAt: Date; idleEndsAt: Date } | null {
  const { startedAt, activeAt } = (req.session ?? {}) as Partial<session.SessionData>
  if (!startedAt || !activeAt) return null
  const end = endsAt(startedAt)
  const idle = idleEndsAt(lastActivity.get(req) ?? activeAt)
  return { endsAt: end, idleEndsAt: idle < end ? idle : end }
}

const lastActivity = new WeakMap<Request, string>()

/**
 * What shows that a person is there (ruling 19): the header the client sends within a minute of real input, or any call
 * that changes something. Uploads, polls and event streams run by themselves and show nothing.
 */
function isActivity(req: Request): boolean {
  if (req.get('x-person-active') === '1') return true
  const changes = !['GET', 'HEAD', 'OPTIONS'].includes(req.method)
  return changes && !req.is('multipart/form-data')
}

/** Written past the session middleware: its save would bring a session back that another request has just ended. */
async function noteActivity({ db }: Services, req: Request, now: Date) {
  const at = now.toISOString()
  lastActivity.set(req, at)
  await db.run(
    `update session.sessions set sess = jsonb_set(sess::jsonb, '{activeAt}', to_jsonb(:at::text))::json where sid = :sid`,
    { at, sid: req.sessionID },
  )
}

/** Reads the session again, for streams that outlive their request. */
export async function sessionLasts({ db, clock }: Services, sessionId: string): Promise<boolean> {
  const found = await db.row<{ started: string | null; active: string | null }>(
    `select sess ->> 'startedAt' as started, sess ->> 'activeAt' as active from session.sessions where sid = :sessionId`,
    { sessionId },
  )
  return !!found?.started && !!found.active && !hasEnded(found.started, found.active, clock.now())
}

function asError(error: unknown): Error {
  return error instanceof Error ? error : new Error(String(error))
}

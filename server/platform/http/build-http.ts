import compression from 'compression'
import express, { Router, type Express, type Response } from 'express'
import { fileURLToPath } from 'node:url'
import path from 'node:path'
import { loadVisitor } from './access.ts'
import { clientFiles } from './client-files.ts'
import { documentationPage } from './documentation.ts'
import { healthRoutes } from './health.ts'
import { limitCalls, limitSignIns } from './limits.ts'
import { mountRoutes } from './mount.ts'
import { openApiDocument } from './openapi.ts'
import { requestLog } from './request-log.ts'
import { answerProblems, noSuchAddress } from './problem-answers.ts'
import type { Route } from './route.ts'
import { allowedHosts, inlineScriptHashes, notStored, ownOriginOnly, securityHeaders } from './security.ts'
import type { SessionStore } from '../identity/session.ts'
import { signInRoutes, type SignInEvents } from '../identity/sign-in.ts'
import type { Services } from '../services.ts'

export interface AppParts {
  routes: Route[]
  sessions: SessionStore
  signIn: SignInEvents
}

const clientFolder = fileURLToPath(new URL('../../../dist/client', import.meta.url))

/** The whole HTTP side: guards first, then the interface, sign-in, documentation and the built client. */
export function buildHttp(services: Services, { routes, sessions, signIn }: AppParts): Express {
  const { config, log } = services
  const app = express()
  app.disable('x-powered-by')
  app.set('etag', false)
  // Behind a proxy (https) the caller's address is the last one the proxy wrote; without one nobody may claim another.
  app.set('trust proxy', config.origin.startsWith('https:') ? 1 : false)
  app.use(requestLog(log))
  app.use(securityHeaders(config, inlineScriptHashes(path.join(clientFolder, 'index.html'))))
  app.use(allowedHosts(config))
  app.use(healthRoutes(services))
  app.use(compression({ filter: (req, res) => mayBeCompressed(res) && compression.filter(req, res) }))
  app.use('/api/v1', interfaceOf(services, routes, sessions))
  app.use('/api', noSuchAddress)
  app.use(
    '/auth',
    notStored,
    limitSignIns(),
    sessions.middleware,
    signInRoutes(services, signIn),
    noSuchAddress,
  )
  app.use('/docs/api', documentationPage())
  app.use(clientFiles(clientFolder))
  app.use(noSuchAddress)
  app.use(answerProblems(services))
  return app
}

const JSON_LIMIT = '5mb'

function interfaceOf(services: Services, routes: Route[], sessions: SessionStore): Router {
  const { config } = services
  const router = Router()
  const document = openApiDocument(config.origin)
  router.use(notStored)
  router.get('/openapi.json', (_req, res) => {
    res.json(document)
  })
  router.use(ownOriginOnly(config), sessions.middleware, loadVisitor(services), limitCalls())
  router.use(express.json({ limit: JSON_LIMIT, strict: false }))
  router.use(mountRoutes(services, routes))
  router.use(noSuchAddress)
  return router
}

/** Not a stream of events, which must leave at once, nor bytes whose digest or range the answer states. */
function mayBeCompressed(res: Response): boolean {
  const type = String(res.getHeader('Content-Type') ?? '')
  return (
    !type.startsWith('text/event-stream') && !res.hasHeader('Content-Range') && !res.hasHeader('Repr-Digest')
  )
}

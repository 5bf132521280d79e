import type { Express } from 'express'
import { calculationRoutes } from './features/calculations/index.ts'
import { contentRoutes, waitingCount } from './features/entries/index.ts'
import { exportRoutes } from './features/exports/index.ts'
import { fileRoutes } from './features/files/index.ts'
import { keyRoutes, signingKeyStatuses } from './features/keys/index.ts'
import { ledgerRoutes } from './features/ledger/index.ts'
import { notebookRoutes } from './features/notebooks/index.ts'
import { peopleRoutes, recordSignIn } from './features/people/index.ts'
import { runRoutes } from './features/runs/index.ts'
import { sheetRoutes } from './features/sheets/index.ts'
import { signatureRoutes } from './features/signatures/index.ts'
import { buildHttp } from './platform/http/build-http.ts'
import type { Route } from './platform/http/route.ts'
import type { SessionStore } from './platform/identity/session.ts'
import type { Services } from './platform/services.ts'

/** Every feature's calls. A capability is mounted by its line here. */
export function featureRoutes(services: Services): Route[] {
  const neighbours = {
    keyStatuses: (ids: readonly string[]) => signingKeyStatuses(services, ids),
    waitingCount: (personId: string) => waitingCount(services.db, personId),
  }
  return [
    ...peopleRoutes(services, neighbours),
    ...notebookRoutes(services),
    ...contentRoutes(services),
    ...sheetRoutes(services),
    ...runRoutes(services),
    ...fileRoutes(services),
    ...calculationRoutes(services),
    ...keyRoutes(services),
    ...signatureRoutes(services),
    ...ledgerRoutes(services),
    ...exportRoutes(services),
  ]
}

/** The whole product as one Express application. */
export function buildApp(services: Services, sessions: SessionStore): Express {
  return buildHttp(services, {
    routes: featureRoutes(services),
    sessions,
    signIn: { onSignIn: (personId) => recordSignIn(services, personId) },
  })
}

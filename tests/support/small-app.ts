import type { AddressInfo } from 'node:net'
import { settableClock, type SettableClock } from '../../server/platform/clock.ts'
import { readConfig, type Config } from '../../server/platform/config.ts'
import { buildHttp } from '../../server/platform/http/build-http.ts'
import type { Route } from '../../server/platform/http/route.ts'
import { serve } from '../../server/platform/http/serve.ts'
import { openSessions } from '../../server/platform/identity/session.ts'
import { openLog } from '../../server/platform/logger.ts'
import { openServices } from '../../server/platform/open-services.ts'
import type { Services } from '../../server/platform/services.ts'
import { freePort } from '../../server/launch/ports.mjs'

export interface SmallApp {
  url: string
  services: Services
  clock: SettableClock
  /** Lines that were logged. */
  logged: string[]
  close(): Promise<void>
}

/**
 * The HTTP side of the product with routes and a clock of the test's own, on the running product's database and stand-ins,
 * at a port of its own.
 */
export async function startSmallApp(
  environment: Record<string, string>,
  routes: (services: Services) => Route[],
  change: (config: Config) => Config = (config) => config,
): Promise<SmallApp> {
  const port = await freePort()
  const url = `http://127.0.0.1:${port}`
  const config = change(readConfig({ ...environment, PORT: String(port), PUBLIC_ORIGIN: url }))
  const clock = settableClock(new Date())
  const logged: string[] = []
  const log = openLog('test', { write: (line: string) => void logged.push(line) })
  const { services, close } = await openServices(config, config.database.app, log, clock)
  const sessions = openSessions(config)
  const app = buildHttp(services, {
    routes: routes(services),
    sessions,
    signIn: { onSignIn: async () => undefined },
  })
  const http = await serve(app, port)
  if ((http.server.address() as AddressInfo).port !== port) throw new Error('served at another port')
  return {
    url,
    services,
    clock,
    logged,
    async close() {
      await http.close()
      await close()
      await sessions.close()
    },
  }
}

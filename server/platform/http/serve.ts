import { createServer, type Server } from 'node:http'
import type { Express } from 'express'

/** Nothing read or written on a connection for this long ends it (also an upload that stalls). */
const IDLE_MS = 120_000
const HEADERS_MS = 30_000
/** An upload may take this long altogether (ruling 19). */
const UPLOAD_HOURS = 24
const CLOSE_MS = 5000

/** Serves on loopback; TLS and other machines are the business of a proxy in front (docs/deploy.md). */
export async function serve(app: Express, port: number): Promise<{ server: Server; close(): Promise<void> }> {
  const server = createServer(
    { requestTimeout: UPLOAD_HOURS * 3_600_000, headersTimeout: HEADERS_MS, keepAliveTimeout: 65_000 },
    app,
  )
  server.timeout = IDLE_MS
  await new Promise<void>((done, fail) => {
    server.once('error', fail)
    server.listen(port, '127.0.0.1', done)
  })
  return {
    server,
    close: () =>
      new Promise((done) => {
        server.close(() => done())
        server.closeIdleConnections()
        // What still runs, event streams above all, is cut after the time that an ordinary request needs.
        setTimeout(() => server.closeAllConnections(), CLOSE_MS).unref()
      }),
  }
}

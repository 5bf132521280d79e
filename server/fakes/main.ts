import type { AddressInfo } from 'node:net'
import type { Server } from 'node:http'
import path from 'node:path'
import type { Express } from 'express'
import { codeHost } from './code-host.ts'
import { mailServer } from './mail-server.ts'
import { createTimeStampAuthority, serveTimeStampAuthority } from './time-stamp-authority.ts'

/*
 * Starts the stand-ins named in FAKES (code-host, mail, stamps), each on a port of its own on loopback, and prints one JSON
 * line with the ports. Ports come from the environment, or free ones are taken.
 */
const wanted = (process.env.FAKES ?? 'code-host,mail,stamps').split(',').filter(Boolean)
const folder = process.env.FAKES_FOLDER ?? '.data/fakes'
const closers: (() => void)[] = []
const portOf = (name: string) => Number(process.env[name] ?? 0)

function serve(app: Express, port: number): Promise<number> {
  return new Promise((done, fail) => {
    const server = app.listen(port, '127.0.0.1', (error?: Error) =>
      error ? fail(error) : done(opened(server)),
    )
  })
}

function opened(server: Server): number {
  closers.push(() => {
    server.closeAllConnections()
    server.close()
  })
  return (server.address() as AddressInfo).port
}

async function startMail() {
  const { smtp, inbox } = mailServer()
  await new Promise<void>((done) => smtp.listen(portOf('SMTP_PORT'), '127.0.0.1', done))
  closers.push(() => smtp.close())
  return {
    smtpPort: (smtp.server.address() as AddressInfo).port,
    inboxPort: await serve(inbox, portOf('INBOX_PORT')),
  }
}

async function startCodeHost() {
  const clientId = process.env.OAUTH_CLIENT_ID ?? 'halfsilver'
  const clientSecret = process.env.OAUTH_CLIENT_SECRET ?? ''
  if (clientSecret === '') throw new Error('OAUTH_CLIENT_SECRET is not set')
  return { codeHostPort: await serve(codeHost({ clientId, clientSecret }), portOf('CODE_HOST_PORT')) }
}

async function startStamps() {
  const authority = await createTimeStampAuthority({
    folder: path.join(folder, 'stamps'),
    clock: { now: () => new Date() },
  })
  const server = await serveTimeStampAuthority(authority, portOf('TSA_PORT'))
  return { stampsPort: opened(server), chainFile: path.resolve(authority.chainFile) }
}

const starters: Record<string, () => Promise<object>> = {
  'code-host': startCodeHost,
  mail: startMail,
  stamps: startStamps,
}
const started = await Promise.all(
  wanted.map((name) => {
    const start = starters[name]
    if (!start) throw new Error(`FAKES names ${name}; known are ${Object.keys(starters).join(', ')}`)
    return start()
  }),
)
process.stdout.write(`${JSON.stringify(Object.assign({}, ...started))}\n`)
process.send?.('ready')

function stop() {
  for (const close of closers) close()
  process.exit(0)
}
process.once('SIGTERM', stop)
process.once('SIGINT', stop)
process.once('disconnect', stop)

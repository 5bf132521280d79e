import pg from 'pg'
import type { Database, Transaction } from '../db/database.ts'
import type { Logger } from '../logger.ts'

export type EventHandler = (payload: unknown) => void

/** Short messages between the processes over PostgreSQL LISTEN/NOTIFY; nobody listening means nobody hears. */
export interface Events {
  /** Sends JSON (under 7 kB) to all listeners of the channel; inside a transaction only when that commits. */
  notify(channel: string, payload: unknown, t?: Transaction): Promise<void>
  /** Calls the handler for each message until the returned function is called. */
  listen(channel: string, handler: EventHandler): () => void
  close(): Promise<void>
}

const POSTGRES_CHANNEL = 'halfsilver'
const RECONNECT_MS = 1000

/** One connection listens for the whole process; a lost connection is opened again, messages in between are lost. */
export async function openEvents(url: string, db: Database, log: Logger): Promise<Events> {
  const handlers = new Map<string, Set<EventHandler>>()
  let client: pg.Client | null = null
  let closed = false

  function hear(message: string) {
    const { channel, payload } = JSON.parse(message) as { channel: string; payload: unknown }
    for (const handler of handlers.get(channel) ?? []) {
      try {
        handler(payload)
      } catch (error) {
        log.error({ err: error, channel }, 'a listener failed')
      }
    }
  }

  async function connect() {
    const next = new pg.Client({
      connectionString: url,
      application_name: 'halfsilver events',
      keepAlive: true,
    })
    next.on('notification', ({ payload }) => hear(payload ?? 'null'))
    next.on('error', (error) => log.warn({ err: error }, 'the event connection failed'))
    next.on('end', () => {
      if (!closed && client === next) reconnect()
    })
    await next.connect()
    await next.query(`listen ${POSTGRES_CHANNEL}`)
    client = next
  }

  function reconnect() {
    client = null
    setTimeout(() => {
      if (!closed) connect().catch(reconnect)
    }, RECONNECT_MS).unref()
  }

  await connect()
  return {
    async notify(channel, payload, t) {
      const message = JSON.stringify({ channel, payload })
      await db.rows('select pg_notify(:to, :message)', { to: POSTGRES_CHANNEL, message }, t)
    },
    listen(channel, handler) {
      const own = handlers.get(channel) ?? new Set()
      handlers.set(channel, own.add(handler))
      return () => {
        own.delete(handler)
        if (own.size === 0) handlers.delete(channel)
      }
    },
    async close() {
      closed = true
      await client?.end()
    },
  }
}

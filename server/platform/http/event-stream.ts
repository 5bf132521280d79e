import type { Endpoint } from '../../contract/endpoint.ts'
import { sessionLasts } from '../identity/session.ts'
import type { Services } from '../services.ts'
import { tokenActor } from './actor.ts'
import type { Context } from './route.ts'

export interface EventStream {
  /** Sends one event with JSON data; after the end it does nothing. */
  send(event: string, data: unknown): void
  close(): void
  /** Aborts when the browser leaves, the session ends, or `close` is called: stop listening then. */
  ended: AbortSignal
}

const BEAT_MS = 15_000

/**
 * Server-sent events for one request. Every 15 s it sends a comment, so that nothing in between takes the connection for
 * dead, and ends the stream when the session has ended meanwhile (ruling 19).
 */
export function openEventStream<E extends Endpoint>(
  services: Services,
  { req, res, actor }: Context<E>,
): EventStream {
  const ended = new AbortController()
  res.status(200).set({
    'Content-Type': 'text/event-stream',
    'Cache-Control': 'no-store, no-transform',
    'X-Accel-Buffering': 'no',
  })
  res.flushHeaders()

  async function maySee(): Promise<boolean> {
    if (actor.sessionId !== undefined) return sessionLasts(services, actor.sessionId)
    const secret = req.get('authorization')?.slice('Bearer '.length) ?? ''
    return (await tokenActor(services.db, services.clock, secret)) !== null
  }

  function close() {
    clearInterval(beat)
    if (!ended.signal.aborted) ended.abort()
    res.end()
  }

  const beat = setInterval(() => {
    res.write(': still here\n\n')
    maySee().then((may) => may || close(), close)
  }, BEAT_MS)
  res.on('close', close)
  return {
    send: (event, data) => {
      if (!ended.signal.aborted) res.write(`event: ${event}\ndata: ${JSON.stringify(data)}\n\n`)
    },
    close,
    ended: ended.signal,
  }
}

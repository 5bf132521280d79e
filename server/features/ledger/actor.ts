import type { Actor } from '../../ledger-format/event.ts'

/** Who made a request: a person in a session, or a token of a person. */
export interface RequestActor {
  personId: string
  tokenId?: string | null
}

/** The actor of an event that a request causes; an act by token is on behalf of its person. */
export function actorOf({ personId, tokenId }: RequestActor): Actor {
  return tokenId === undefined || tokenId === null
    ? { kind: 'person', id: personId, onBehalfOf: null }
    : { kind: 'token', id: tokenId, onBehalfOf: personId }
}

/** What the product does by itself. */
export const systemActor: Actor = { kind: 'system', id: null, onBehalfOf: null }

/** A worker that finishes what a person asked for. */
export function workerActor(onBehalfOf: string | null): Actor {
  return { kind: 'worker', id: null, onBehalfOf }
}

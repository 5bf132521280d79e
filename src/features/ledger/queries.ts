import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query'
import { call } from '../../lib/call.ts'

export type EventFilter = { action?: string; subject?: string }

/** Events newest first, a page at a time. */
export function eventsQuery({ action, subject }: EventFilter) {
  return infiniteQueryOptions({
    queryKey: ['ledger', 'events', action ?? 'any', subject ?? 'any'],
    queryFn: ({ pageParam, signal }) =>
      call('listEvents', { query: { limit: 40, action, subject, cursor: pageParam ?? undefined }, signal }),
    initialPageParam: null as string | null,
    getNextPageParam: (last) => last.nextCursor,
  })
}

/** The newest signed head. */
export const headQuery = queryOptions({
  queryKey: ['ledger', 'head'],
  queryFn: ({ signal }) => call('getHead', { signal }),
})

export const anchorsQuery = queryOptions({
  queryKey: ['ledger', 'anchors'],
  queryFn: ({ signal }) => call('getAnchors', { signal }),
  staleTime: Number.POSITIVE_INFINITY,
})

/** The proof that an event stands in the tree of a head. */
export function inclusionProofQuery(sequence: number, treeSize: number) {
  return queryOptions({
    queryKey: ['ledger', 'proof', sequence, treeSize],
    queryFn: ({ signal }) =>
      call('getInclusionProof', { params: { seq: sequence }, query: { treeSize }, signal }),
    staleTime: Number.POSITIVE_INFINITY,
  })
}

/** The whole chain recomputed by the server; kept as the last result that the page shows. */
export const verificationQuery = queryOptions({
  queryKey: ['ledger', 'verification'],
  queryFn: ({ signal }) => call('verifyLedger', { body: {}, signal }),
  staleTime: Number.POSITIVE_INFINITY,
  gcTime: Number.POSITIVE_INFINITY,
})

type EventPage = Awaited<ReturnType<typeof call<'listEvents'>>>
/** An event with the names that the interface adds. */
export type ShownEvent = EventPage['items'][number]

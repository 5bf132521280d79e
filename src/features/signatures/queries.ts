import { queryOptions } from '@tanstack/react-query'
import { call } from '../../lib/call.ts'
import { queryKeys } from '../../lib/query-keys.ts'

/** My signing key: how it stands and the parameters that turn a passphrase into it. */
export const signingKeyQuery = queryOptions({
  queryKey: ['signing-key'] as const,
  queryFn: ({ signal }) => call('getSigningKey', { signal }),
  staleTime: 0,
})

/** The enrolment of a person, to be checked and endorsed. */
export function enrolmentQuery(personId: string) {
  return queryOptions({
    queryKey: [...queryKeys.people, personId, 'enrolment'] as const,
    queryFn: ({ signal }) => call('getEnrolment', { params: { id: personId }, signal }),
    staleTime: 0,
  })
}

/** Sheets that wait for me as witness. */
export const witnessQueueQuery = queryOptions({
  queryKey: [...queryKeys.myEntries('waiting'), 'queue'] as const,
  queryFn: async ({ signal }) =>
    (await call('listMyEntries', { query: { waiting: true, limit: 200 }, signal })).items,
})

/** The latest sheets that I may read, for what stands with authors and what is sealed. */
export const readableEntriesQuery = queryOptions({
  queryKey: [...queryKeys.myEntries('all'), 'witness-desk'] as const,
  queryFn: async ({ signal }) => (await call('listMyEntries', { query: { limit: 200 }, signal })).items,
})

/** One entry, for the margin of the desk: the same reply that its sheet shows. */
export function entryForReviewQuery(id: string) {
  return queryOptions({
    queryKey: [...queryKeys.entry(id), 'review'] as const,
    queryFn: ({ signal }) => call('getEntry', { params: { id }, signal }),
  })
}

export type DeskEntry = Awaited<ReturnType<typeof call<'listMyEntries'>>>['items'][number]

/** One calculation in full, under the name that the sheet's blocks use too: what they have read counts as opened. */
export function calculationQuery(id: string) {
  return queryOptions({
    queryKey: queryKeys.calculation(id),
    queryFn: ({ signal }) => call('getCalculation', { params: { id }, signal }),
  })
}

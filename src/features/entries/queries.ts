import { queryOptions } from '@tanstack/react-query'
import { checkDocument } from '../../../server/document/index.ts'
import { call, callForAnswer } from '../../lib/call.ts'
import { queryKeys } from '../../lib/query-keys.ts'

export const entryQuery = (id: string) =>
  queryOptions({
    queryKey: queryKeys.entry(id),
    queryFn: ({ signal }) => call('getEntry', { params: { id }, signal }),
  })

export const entriesOfNotebookQuery = (notebookId: string) =>
  queryOptions({
    queryKey: queryKeys.entriesOf(notebookId),
    queryFn: ({ signal }) =>
      call('listEntries', { params: { id: notebookId }, query: { limit: 200 }, signal }),
  })

/** Entries the person may read, newest change first: all, those written by the person, or those to be witnessed. */
export const myEntriesQuery = (which: 'all' | 'mine' | 'waiting') =>
  queryOptions({
    queryKey: queryKeys.myEntries(which),
    queryFn: ({ signal }) =>
      call('listMyEntries', {
        query: {
          limit: 50,
          ...(which === 'mine' ? { mine: true } : {}),
          ...(which === 'waiting' ? { waiting: true } : {}),
        },
        signal,
      }),
  })

/** The text with the ETag that a save must name. It is read when a sheet opens; after that the editor holds it. */
export const contentQuery = (id: string) =>
  queryOptions({
    queryKey: queryKeys.content(id),
    queryFn: () => fetchContent(id),
    staleTime: 0,
    gcTime: 0,
  })

export async function fetchContent(id: string) {
  const { reply, etag } = await callForAnswer('getContent', { params: { id } })
  return { document: checkDocument(reply, () => crypto.randomUUID()), etag: etag ?? '*' }
}

import { queryOptions } from '@tanstack/react-query'
import { call } from '../../lib/call.ts'
import { queryKeys } from '../../lib/query-keys.ts'

/** The latest runs of a notebook. */
export const latestRunsQuery = (notebookId: string) =>
  queryOptions({
    queryKey: queryKeys.runsOf(notebookId),
    queryFn: ({ signal }) => call('listRuns', { params: { id: notebookId }, query: { limit: 8 }, signal }),
  })

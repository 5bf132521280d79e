import { queryOptions } from '@tanstack/react-query'
import { call } from '../../lib/call.ts'
import { queryKeys } from '../../lib/query-keys.ts'

/** Notebooks the person may read. */
export const notebooksQuery = queryOptions({
  queryKey: queryKeys.notebooks,
  queryFn: ({ signal }) => call('listNotebooks', { query: { limit: 200 }, signal }),
})

export const notebookQuery = (id: string) =>
  queryOptions({
    queryKey: queryKeys.notebook(id),
    queryFn: ({ signal }) => call('getNotebook', { params: { id }, signal }),
  })

/** People of the laboratory, to be added to a notebook. */
export const peopleQuery = queryOptions({
  queryKey: queryKeys.people,
  queryFn: ({ signal }) => call('listPeople', { signal }),
})

import { queryOptions } from '@tanstack/react-query'
import { call } from '../../lib/call.ts'
import { queryKeys } from '../../lib/query-keys.ts'

/** Everybody of the laboratory, ended people too: a person is never deleted. */
export const peopleQuery = queryOptions({
  queryKey: queryKeys.people,
  queryFn: ({ signal }) => call('listPeople', { signal }),
})

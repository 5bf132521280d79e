import { queryOptions } from '@tanstack/react-query'
import type { Entry } from '../../../server/contract/entries.ts'
import { call } from '../../lib/call.ts'

/**
 * Every calculation of the entry in full, with its quality notes: read for the witness, whose GETs tell the server that they
 * were opened.
 */
export function openedCalculationsQuery(entry: Pick<Entry, 'id' | 'calculations'>) {
  const ids = entry.calculations.map((each) => each.id)
  return queryOptions({
    queryKey: ['calculations', 'of-entry', entry.id, ...ids] as const,
    queryFn: ({ signal }) => Promise.all(ids.map((id) => call('getCalculation', { params: { id }, signal }))),
    staleTime: 0,
  })
}

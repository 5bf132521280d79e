import { queryOptions } from '@tanstack/react-query'
import type { Calculation } from '../../../server/contract/calculations.ts'
import { call } from '../../lib/call.ts'
import { queryKeys } from '../../lib/query-keys.ts'

/** Events tell of progress at once; this look now and then is for when they do not come through. */
const pollMs = 2500

export const isGoingOn = (status: Calculation['status']): boolean =>
  status === 'queued' || status === 'running'

export const calculationQuery = (id: string) =>
  queryOptions({
    queryKey: queryKeys.calculation(id),
    queryFn: ({ signal }) => call('getCalculation', { params: { id }, signal }),
    staleTime: 5_000,
    refetchInterval: ({ state }) => (state.data && isGoingOn(state.data.status) ? pollMs : false),
  })

/** The picture of a finished calculation; one picture for each result, so that an old one can stay until the new comes. */
export const figureQuery = (id: string, resultSha256: string | null) =>
  queryOptions({
    queryKey: [...queryKeys.figure(id), resultSha256],
    queryFn: ({ signal }) => call('getCalculationFigure', { params: { id }, signal }),
    staleTime: Number.POSITIVE_INFINITY,
    enabled: resultSha256 !== null,
    retry: false,
    placeholderData: (previous) => previous,
  })

export const kindsQuery = queryOptions({
  queryKey: queryKeys.calculationKinds,
  queryFn: ({ signal }) => call('listCalculationKinds', { signal }),
  staleTime: Number.POSITIVE_INFINITY,
})

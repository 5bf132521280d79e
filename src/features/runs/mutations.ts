import { useMutation, useQueryClient } from '@tanstack/react-query'
import type { Experiment } from '../../../server/contract/common.ts'
import type { Condition } from '../../../server/contract/runs.ts'
import { call } from '../../lib/call.ts'
import { queryKeys } from '../../lib/query-keys.ts'

/** A run filed in the entry. */
export function useAddRun(entryId: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (run: { experiment: Experiment }) =>
      call('createRunInEntry', { params: { id: entryId }, body: run }),
    onSuccess: () => client.invalidateQueries({ queryKey: queryKeys.entry(entryId), exact: true }),
  })
}

interface RunChange {
  startedAt?: string
  conditions?: Condition[]
}

/** Changes a run that is not frozen. */
export function useChangeRun(runId: string, entryId: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (change: RunChange) => call('changeRun', { params: { id: runId }, body: change }),
    onSuccess: () => client.invalidateQueries({ queryKey: queryKeys.entry(entryId), exact: true }),
  })
}

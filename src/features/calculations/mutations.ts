import { useMutation, useQueryClient, type QueryClient } from '@tanstack/react-query'
import type { Calculation } from '../../../server/contract/calculations.ts'
import { call } from '../../lib/call.ts'
import { queryKeys } from '../../lib/query-keys.ts'

function keep(client: QueryClient, calculation: Calculation): void {
  client.setQueryData(queryKeys.calculation(calculation.id), calculation)
  void client.invalidateQueries({ queryKey: queryKeys.entry(calculation.entryId), exact: true })
}

export interface NewCalculation {
  kind: string
  inputs: { fileId: string }[]
  parameters: Record<string, unknown>
}

/** Starts calculations of an entry, one after the other, so that their labels follow the order asked for. */
export function useStartCalculations(entryId: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: async (wanted: NewCalculation[]) => {
      const started: Calculation[] = []
      for (const body of wanted) {
        const calculation = await call('startCalculation', { params: { id: entryId }, body })
        keep(client, calculation)
        started.push(calculation)
      }
      return started
    },
  })
}

/** Computes a block again, with other parameters or the same: the answer is a calculation that takes its place. */
export function useRecompute(id: string, onSuccessor: (successorId: string) => void) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (parameters: Record<string, unknown>) =>
      call('recompute', { params: { id }, body: { parameters } }),
    onSuccess: (calculation) => {
      keep(client, calculation)
      onSuccessor(calculation.id)
    },
  })
}

/** Stops a calculation that waits or runs. */
export function useStop(id: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: () => call('cancelCalculation', { params: { id } }),
    onSuccess: (calculation) => keep(client, calculation),
  })
}

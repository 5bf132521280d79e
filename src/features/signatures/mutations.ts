import { useMutation, useQueryClient } from '@tanstack/react-query'
import { call } from '../../lib/call.ts'
import { lifeOfEntryChanged } from './invalidate.ts'

/** Back to the author, also while authors still sign (then it is a reopening); voids the signatures given. */
export function useReturnEntry(entryId: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (reason: string) => call('returnEntry', { params: { id: entryId }, body: { reason } }),
    onSuccess: () => lifeOfEntryChanged(client),
  })
}

export function useWithdrawEntry(entryId: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (reason: string) => call('withdrawEntry', { params: { id: entryId }, body: { reason } }),
    onSuccess: () => lifeOfEntryChanged(client),
  })
}

/** A new entry that amends a sealed one. */
export function useCreateAddendum(entryId: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (title: string) => call('createAddendum', { params: { id: entryId }, body: title ? { title } : {} }),
    onSuccess: () => lifeOfEntryChanged(client),
  })
}

import { useMutation, useQueryClient } from '@tanstack/react-query'
import type { Role } from '../../../server/contract/common.ts'
import { call } from '../../lib/call.ts'
import { queryKeys } from '../../lib/query-keys.ts'

/** A new notebook, kept by whoever creates it. */
export function useCreateNotebook() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (title: string) => call('createNotebook', { body: { title } }),
    onSuccess: () => client.invalidateQueries({ queryKey: queryKeys.notebooks }),
  })
}

/** Adds a person in a role, or changes the role. */
export function useSetMember(notebookId: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: ({ personId, role }: { personId: string; role: Role }) =>
      call('setMember', { params: { id: notebookId, personId }, body: { role } }),
    onSuccess: () => client.invalidateQueries({ queryKey: queryKeys.notebooks }),
  })
}

export function useRemoveMember(notebookId: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (personId: string) => call('removeMember', { params: { id: notebookId, personId } }),
    onSuccess: () => client.invalidateQueries({ queryKey: queryKeys.notebooks }),
  })
}

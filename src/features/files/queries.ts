import { useMutation, useQueryClient } from '@tanstack/react-query'
import { call } from '../../lib/call.ts'
import { queryKeys } from '../../lib/query-keys.ts'

/** Says how a file is to be read; what was computed from it is out of date then. */
export function useSetReading(fileId: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (reading: { format: string; options: Record<string, unknown> }) =>
      call('setReading', { params: { id: fileId }, body: reading }),
    onSuccess: () =>
      Promise.all([
        client.invalidateQueries({ queryKey: ['entries'] }),
        client.invalidateQueries({ queryKey: ['calculations'] }),
        client.invalidateQueries({ queryKey: queryKeys.file(fileId) }),
      ]),
  })
}

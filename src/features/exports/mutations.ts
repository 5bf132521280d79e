import { useMutation, useQueryClient } from '@tanstack/react-query'
import { call } from '../../lib/call.ts'
import { exportQuery, exportsQuery } from './queries.ts'

export type ExportChoice = { withoutRaw: boolean } & ({ notebookId: string } | { entryIds: string[] })

/** Starts a bundle; the list of exports shows how it goes. */
export function useStartExport() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (choice: ExportChoice) => call('startExport', { body: choice }),
    onSuccess: async (started) => {
      client.setQueryData(exportQuery(started.id).queryKey, started)
      await client.invalidateQueries({ queryKey: exportsQuery.queryKey })
    },
  })
}

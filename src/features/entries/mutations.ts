import { useMutation, useQueryClient } from '@tanstack/react-query'
import type { Experiment } from '../../../server/contract/common.ts'
import type { Entry } from '../../../server/contract/entries.ts'
import { call } from '../../lib/call.ts'
import { queryKeys } from '../../lib/query-keys.ts'
import { templateDocument } from './experiments.ts'

interface NewSheet {
  notebookId: string
  title: string
  experiment: Experiment
  /** Start with the heads of a template instead of an empty page. */
  withHeads: boolean
}

/** Starts a sheet: the next number of the notebook, and the heads of its template as first text. */
export function useStartSheet() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: async ({ notebookId, title, experiment, withHeads }: NewSheet) => {
      const entry = await call('createEntry', { params: { id: notebookId }, body: { title, experiment } })
      if (withHeads) {
        await call('putContent', { params: { id: entry.id }, body: { ...templateDocument() }, ifMatch: '*' })
      }
      return entry
    },
    onSuccess: (entry) => {
      client.setQueryData(queryKeys.entry(entry.id), entry)
      void client.invalidateQueries({ queryKey: queryKeys.entriesOf(entry.notebookId) })
      void client.invalidateQueries({ queryKey: ['entries', 'list'] })
    },
  })
}

type Change = Partial<Pick<Entry, 'title' | 'experiment' | 'runAt' | 'lateRemark' | 'important'>>

/** Title, experiment, time of the run, remark on late writing, importance. */
export function useChangeEntry(id: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (change: Change) => call('changeEntry', { params: { id }, body: change }),
    onSuccess: (entry) => {
      client.setQueryData(queryKeys.entry(id), entry)
      void client.invalidateQueries({ queryKey: queryKeys.entriesOf(entry.notebookId) })
      void client.invalidateQueries({ queryKey: ['entries', 'list'] })
    },
  })
}

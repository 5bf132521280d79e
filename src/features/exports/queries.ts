import { queryOptions } from '@tanstack/react-query'
import type { BundleExport } from '../../../server/contract/exports.ts'
import { call } from '../../lib/call.ts'
import { queryKeys } from '../../lib/query-keys.ts'

const pollMs = 1500

/** True when nothing more happens to an export by itself. */
function isSettled(bundle: Pick<BundleExport, 'status'>): boolean {
  return bundle.status === 'done' || bundle.status === 'failed'
}

/** My exports, newest first; asked for again while one is under way. */
export const exportsQuery = queryOptions({
  queryKey: ['exports'] as const,
  queryFn: ({ signal }) => call('listExports', { signal }),
  refetchInterval: (query) => ((query.state.data?.items.every(isSettled) ?? true) ? false : pollMs),
})

/** One export, until it is settled. */
export function exportQuery(id: string) {
  return queryOptions({
    queryKey: ['exports', id] as const,
    queryFn: ({ signal }) => call('getExport', { params: { id }, signal }),
    refetchInterval: (query) => (query.state.data && isSettled(query.state.data) ? false : pollMs),
  })
}

/** Notebooks to choose from. */
export const exportableNotebooksQuery = queryOptions({
  queryKey: [...queryKeys.notebooks, 'exportable'] as const,
  queryFn: async ({ signal }) =>
    (await call('listNotebooks', { query: { limit: 200 }, signal })).items.filter((each) =>
      each.allowed.includes('export'),
    ),
})

/** Entries of a notebook, to choose the sealed ones. */
export function entriesToExportQuery(notebookId: string) {
  return queryOptions({
    queryKey: [...queryKeys.entriesOf(notebookId), 'to-export'] as const,
    queryFn: async ({ signal }) =>
      (await call('listEntries', { params: { id: notebookId }, query: { limit: 200 }, signal })).items,
  })
}

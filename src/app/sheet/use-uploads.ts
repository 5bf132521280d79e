import { useQueryClient } from '@tanstack/react-query'
import { useEffect, useRef, useState, useSyncExternalStore } from 'react'
import type { Entry } from '../../../server/contract/entries.ts'
import type { RawFile } from '../../../server/contract/files.ts'
import { UploadList, type UploadTarget } from '../../features/files/upload-list.ts'
import { call } from '../../lib/call.ts'
import { queryKeys } from '../../lib/query-keys.ts'

/** Pictures the text can show. */
export const isPicture = (name: string): boolean => /\.(png|jpe?g|webp)$/i.test(name)

/**
 * Files on their way to an entry. A record belongs to a run, with its conditions: it goes to the latest run of the entry
 * that is open, and when there is none, one is begun. Pictures belong to the entry.
 */
export function useUploads(entry: Entry, onStored: (file: RawFile) => void) {
  const client = useQueryClient()
  const latest = useRef({ entry, onStored })
  useEffect(() => {
    latest.current = { entry, onStored }
  })
  const [list] = useState(
    () =>
      new UploadList({
        target: async (file) => {
          const now = latest.current.entry
          if (isPicture(file.name)) return { name: 'uploadToEntry', id: now.id }
          return runTarget(now)
        },
        stored: (file) => {
          void client.invalidateQueries({ queryKey: queryKeys.entry(latest.current.entry.id), exact: true })
          latest.current.onStored(file)
        },
      }),
  )
  return { list, uploads: useSyncExternalStore(list.subscribe, list.getUploads) }

  async function runTarget(now: Entry): Promise<UploadTarget> {
    const open = now.runs.findLast((run) => !run.frozen)
    const run =
      open ??
      (await call('createRunInEntry', { params: { id: now.id }, body: { experiment: now.experiment } }))
    if (!open) await client.invalidateQueries({ queryKey: queryKeys.entry(now.id), exact: true })
    return { name: 'uploadToRun', id: run.id }
  }
}

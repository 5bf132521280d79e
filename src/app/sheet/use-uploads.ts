import { useQueryClient } from '@tanstack/react-query'
import { useEffect, useState, useSyncExternalStore } from 'react'
import type { Entry } from '../../../server/contract/entries.ts'
import type { RawFile } from '../../../server/contract/files.ts'
import { UploadList, type UploadPorts, type UploadTarget } from '../../features/files/upload-list.ts'
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
  const look = () => client.invalidateQueries({ queryKey: queryKeys.entry(entry.id), exact: true })
  const ports: UploadPorts = {
    target: async (file) => {
      if (isPicture(file.name)) return { name: 'uploadToEntry', id: entry.id }
      return runTarget(entry, look)
    },
    stored: (file) => {
      void look()
      onStored(file)
    },
  }
  const [list] = useState(() => new UploadList(ports))
  useEffect(() => list.serve(ports))
  return { list, uploads: useSyncExternalStore(list.subscribe, list.getUploads) }
}

async function runTarget(entry: Entry, look: () => Promise<void>): Promise<UploadTarget> {
  const open = entry.runs.findLast((run) => !run.frozen)
  if (open) return { name: 'uploadToRun', id: open.id }
  const { id } = await call('createRunInEntry', {
    params: { id: entry.id },
    body: { experiment: entry.experiment },
  })
  await look()
  return { name: 'uploadToRun', id }
}

import { useSuspenseQuery } from '@tanstack/react-query'
import type { Entry } from '../../../server/contract/entries.ts'
import type { RawFile } from '../../../server/contract/files.ts'
import { entryQuery } from '../../features/entries/queries.ts'

const pollMs = 1500

/** An entry that is looked at again while something of it is still being read, checked or computed. */
export function useOpenEntry(id: string): Entry {
  return useSuspenseQuery({
    ...entryQuery(id),
    refetchInterval: ({ state }) => (state.data && isGoingOn(state.data) ? pollMs : false),
  }).data
}

/** Files of the entry and of its runs, each once, in the order of upload. */
export function filesOf(entry: Entry): RawFile[] {
  const all = [...entry.files, ...entry.runs.flatMap((run) => run.files)]
  const once = new Map(all.map((file) => [file.id, file]))
  return [...once.values()].sort((one, other) => one.uploadedAt.localeCompare(other.uploadedAt))
}

function isGoingOn(entry: Entry): boolean {
  return (
    filesOf(entry).some(
      ({ reading, state }) => reading.status === 'pending' || state === 'receiving' || state === 'stored',
    ) || entry.calculations.some(({ status }) => status === 'queued' || status === 'running')
  )
}

import { useQueryClient } from '@tanstack/react-query'
import { useEffect } from 'react'
import type { Entry } from '../../../server/contract/entries.ts'
import type { SaveState } from '../../features/entries/content-saver.ts'
import { queryKeys } from '../../lib/query-keys.ts'

/** Whoever saves for the first time becomes an author and may sign: the entry is read anew to say so. */
export function useNewAuthor(entry: Entry, state: SaveState): void {
  const client = useQueryClient()
  const savedAt = state.name === 'saved' ? state.at : null
  const maySign = entry.allowed.includes('sign:authorship')
  useEffect(() => {
    if (savedAt !== null && !maySign)
      void client.invalidateQueries({ queryKey: queryKeys.entry(entry.id), exact: true })
  }, [client, entry.id, savedAt, maySign])
}

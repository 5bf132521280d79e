import type { QueryClient } from '@tanstack/react-query'
import { queryKeys } from '../../lib/query-keys.ts'

/** An act in the life of an entry changes the entry, the lists it stands in, what waits for whom, and the ledger. */
export async function lifeOfEntryChanged(client: QueryClient): Promise<void> {
  const keys = [['entries'], queryKeys.notebooks, queryKeys.session, ['ledger', 'events'], ['ledger', 'head']]
  await Promise.all(keys.map((queryKey) => client.invalidateQueries({ queryKey })))
}

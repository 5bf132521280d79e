import { useQueries } from '@tanstack/react-query'
import type { Entry, EntrySummary } from '../../../server/contract/entries.ts'
import { entryQuery } from '../../features/entries/queries.ts'

/** More than these nobody works on at once. */
const looked = 12

/** The person's unsealed entries in full: what blocks them and how their calculations stand. */
export function useBenchEntries(mine: EntrySummary[]): Entry[] {
  const open = mine.filter((entry) => entry.state === 'draft').slice(0, looked)
  return useQueries({
    queries: open.map((entry) => entryQuery(entry.id)),
    combine: (answers) => answers.flatMap(({ data }) => data ?? []),
  })
}

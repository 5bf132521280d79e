import { useQueries } from '@tanstack/react-query'
import { calculationQuery } from './queries.ts'

/** Which calculations of a sheet are computed from which file: ids of calculations by id of the file. */
export function useInputsUsed(calculationIds: string[]): Map<string, string[]> {
  return useQueries({
    queries: calculationIds.map((id) => calculationQuery(id)),
    combine: (answers) => {
      const used = new Map<string, string[]>()
      for (const { data } of answers) {
        for (const input of data?.inputs ?? []) {
          if ('fileId' in input) used.set(input.fileId, [...(used.get(input.fileId) ?? []), data!.id])
        }
      }
      return used
    },
  })
}

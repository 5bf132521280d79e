import { useQueries } from '@tanstack/react-query'
import { calculationQuery } from './queries.ts'

/** Ids of the files from which the calculations of a sheet are computed. */
export function useInputsUsed(calculationIds: string[]): Set<string> {
  return useQueries({
    queries: calculationIds.map((id) => calculationQuery(id)),
    combine: (answers) =>
      new Set(
        answers.flatMap(({ data }) =>
          (data?.inputs ?? []).flatMap((input) => ('fileId' in input ? [input.fileId] : [])),
        ),
      ),
  })
}

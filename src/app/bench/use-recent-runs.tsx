import { useQueries } from '@tanstack/react-query'
import type { Entry, EntrySummary } from '../../../server/contract/entries.ts'
import type { Notebook } from '../../../server/contract/notebooks.ts'
import type { ShownRun } from '../../features/bench/recent-runs.tsx'
import { FigureName } from '../../features/calculations/key-results.tsx'
import { experimentNames } from '../../features/entries/experiments.ts'
import { entryQuery } from '../../features/entries/queries.ts'
import { latestRunsQuery } from '../../features/runs/queries.ts'
import { Quantity } from '../../ui/quantity.tsx'
import { CurvePreview } from './curve-preview.tsx'

const shown = 6

/** The latest runs over all notebooks, with the last finished calculation of their sheet. */
export function useRecentRuns(
  notebooks: Notebook[],
  entries: EntrySummary[],
): (ShownRun & { entry: Entry | undefined })[] {
  const runs = useQueries({
    queries: notebooks.map((notebook) => latestRunsQuery(notebook.id)),
    combine: (answers) => answers.flatMap(({ data }) => data?.items ?? []),
  })
  const latest = [...runs].sort((one, other) => other.startedAt.localeCompare(one.startedAt)).slice(0, shown)
  const ids = [...new Set(latest.flatMap((run) => run.entryId ?? []))]
  const full = useQueries({
    queries: ids.map((id) => entryQuery(id)),
    combine: (answers) => answers.flatMap(({ data }) => data ?? []),
  })
  return latest.map((run) => {
    const entry = full.find((each) => each.id === run.entryId)
    const summary = entry ?? entries.find((each) => each.id === run.entryId)
    const last = entry?.calculations.findLast(
      (each) => each.status === 'done' && !each.stale && each.figures.length > 0,
    )
    const figure = last?.figures[0]
    return {
      run,
      entry,
      experiment: experimentNames[run.experiment],
      sheet: summary ? { id: summary.id, number: summary.number } : null,
      preview: last ? <CurvePreview calculationId={last.id} /> : null,
      result: figure ? (
        <>
          <FigureName label={figure.label} equals />{' '}
          <Quantity value={figure.value} u={figure.u} unit={figure.unit ?? ''} />
        </>
      ) : (
        // An entry that is still on its way says nothing about its results.
        <span className="hs-quiet">{run.entryId !== null && !entry ? '…' : 'not computed'}</span>
      ),
    }
  })
}

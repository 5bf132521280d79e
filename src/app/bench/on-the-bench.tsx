import { useQuery } from '@tanstack/react-query'
import type { Entry } from '../../../server/contract/entries.ts'
import type { Run } from '../../../server/contract/runs.ts'
import { figureQuery } from '../../features/calculations/queries.ts'
import { experimentNames } from '../../features/entries/experiments.ts'
import { beamNodes, hasFigures, variantOf } from '../../features/runs/beam-figures.ts'
import { dateAndTime } from '../../lib/times.ts'
import { BeamPath } from '../../plots/beam-path/beam-path.tsx'
import { FigurePlot } from '../../plots/figure-plot.tsx'
import { TextLink } from '../../ui/button.tsx'
import { Sheet } from '../../ui/sheet.tsx'
import { entryPath } from '../paths.ts'

/** The latest run as it stands on the table: its set-up with the figures, and its last curve. */
export function OnTheBench({ entry, run }: { entry: Entry | undefined; run: Run | undefined }) {
  const variant = run && variantOf(run.experiment)
  const curve = entry?.calculations.findLast((each) => each.status === 'done' && each.figures.length > 0)
  const { data: figure } = useQuery({
    ...figureQuery(curve?.id ?? '', 'latest'),
    enabled: curve !== undefined,
  })
  if (!run || !entry || !variant) return null
  const nodes = beamNodes(entry, run, variant)
  const lit = hasFigures(nodes)
  return (
    <section className="hs-on-bench" aria-label={`Run ${run.number}`}>
      <p className="hs-on-bench-head">
        <span className="hs-plate">
          <b>Last run {run.number}</b>
        </span>
        <span className="hs-plate">
          {experimentNames[run.experiment]}, {dateAndTime(run.startedAt)}, on sheet{' '}
          <TextLink className="hs-fig" to={entryPath(entry.id)}>
            {entry.number}
          </TextLink>
        </span>
      </p>
      <BeamPath
        variant={variant}
        nodes={nodes}
        state={lit ? 'frozen' : 'no-light'}
        label={`Beam path of run ${run.number}, ${dateAndTime(run.startedAt)}`}
      />
      {figure && (
        <Sheet className="hs-on-bench-plot">
          <FigurePlot figure={figure} height={110} plain />
        </Sheet>
      )}
    </section>
  )
}

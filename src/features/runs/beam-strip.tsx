import type { Entry } from '../../../server/contract/entries.ts'
import { clockTime, longDate } from '../../lib/times.ts'
import { BeamPath } from '../../plots/beam-path/beam-path.tsx'
import { SheetStrip } from '../../ui/sheet.tsx'
import { beamNodes, hasFigures, variantOf } from './beam-figures.ts'

/** The set-up across the sheet with the figures of its run; before there are any, with its shutter closed. */
export function BeamStrip({ entry, experimentName }: { entry: Entry; experimentName: string }) {
  const variant = variantOf(entry.experiment)
  if (!variant) return null
  const run = entry.runs[0]
  const nodes = beamNodes(entry, run, variant)
  const lit = hasFigures(nodes)
  const words = run
    ? `${experimentName} in run ${run.number}, begun ${longDate(run.startedAt)} at ${clockTime(run.startedAt)}`
    : `${experimentName}, no run yet`
  return (
    <SheetStrip
      head={
        <>
          <b>Beam path</b>
          <span>{words}</span>
        </>
      }
      end={lit ? null : <span>The figures appear when singles and coincidences are computed.</span>}
    >
      <BeamPath
        variant={variant}
        nodes={nodes}
        state={lit ? 'frozen' : 'no-light'}
        label={`Beam path: ${words}`}
      />
    </SheetStrip>
  )
}

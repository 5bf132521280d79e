import { useState } from 'react'
import type { Run } from '../../../server/contract/runs.ts'
import { setFigure } from '../../ui/quantity.tsx'
import { dateAndTime } from '../../lib/times.ts'
import { durationText } from '../../lib/picoseconds.ts'
import { TextButton } from '../../ui/button.tsx'
import { Facts } from '../../ui/sheet.tsx'
import { ConditionsForm } from './conditions-form.tsx'

/** A run in the margin: number, time, conditions, apparatus. While the sheet is written, the conditions can be changed. */
export function RunPart({ run, entryId, editable }: { run: Run; entryId: string; editable: boolean }) {
  const [changing, setChanging] = useState(false)
  const open = editable && !run.frozen
  return (
    <section className="hs-run" aria-label={`Run ${run.number}`}>
      <p className="hs-run-head">
        <b className="hs-fig">{run.number}</b>
        <span className="hs-quiet">
          {dateAndTime(run.startedAt)}
          {run.durationPs !== null && `, ${durationText(run.durationPs)}`}
        </span>
        {open && !changing && (
          <TextButton onClick={() => setChanging(true)}>
            {run.conditions.length === 0 ? 'Conditions and start' : 'Change'}
          </TextButton>
        )}
      </p>
      {changing ? (
        <ConditionsForm run={run} entryId={entryId} onClose={() => setChanging(false)} />
      ) : (
        <RunFacts run={run} />
      )}
    </section>
  )
}

function RunFacts({ run }: { run: Run }) {
  const conditions = run.conditions.map(({ name, value, u, unit }) => ({
    name,
    value: [setFigure(value), u !== null && `± ${setFigure(u)}`, unit !== '1' && unit]
      .filter(Boolean)
      .join(' '),
  }))
  const apparatus = run.apparatus.map(({ kind, name, role, channel }) => ({
    name: kind.charAt(0).toUpperCase() + kind.slice(1),
    value: [name, role, channel !== null && `channel ${channel}`].filter(Boolean).join(', '),
    words: true,
  }))
  if (conditions.length + apparatus.length === 0) return null
  return <Facts facts={[...conditions, ...apparatus]} />
}

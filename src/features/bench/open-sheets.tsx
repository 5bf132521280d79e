import { Link } from 'react-router-dom'
import type { EntrySummary } from '../../../server/contract/entries.ts'
import { nearTime } from '../../lib/times.ts'
import { StateGlyph, type StateName } from '../../ui/state-glyph.tsx'

interface OpenSheetsProps {
  entries: EntrySummary[]
  glyphOf: (phase: EntrySummary['phase']) => StateName
  pathOf: (id: string) => string
}

/** Sheets that are not sealed yet, latest change first. */
export function OpenSheets({ entries, glyphOf, pathOf }: OpenSheetsProps) {
  if (entries.length === 0) return <p className="hs-quiet">No sheet is open.</p>
  return (
    <ul className="hs-stack">
      {entries.map((entry) => (
        <li key={entry.id}>
          <span className="hs-fig">{entry.number}</span>
          <Link to={pathOf(entry.id)}>{entry.title}</Link>
          <p>
            <StateGlyph state={glyphOf(entry.phase)} />
            <span>{nearTime(entry.updatedAt)}</span>
          </p>
        </li>
      ))}
    </ul>
  )
}

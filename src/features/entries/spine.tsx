import { Link } from 'react-router-dom'
import type { EntrySummary } from '../../../server/contract/entries.ts'
import { TextLink } from '../../ui/button.tsx'
import { StateGlyph } from '../../ui/state-glyph.tsx'
import { glyphOf, sheetNumber } from './entry-state.ts'

interface SpineProps {
  notebook: { number: string; title: string }
  notebookPath: string
  entries: EntrySummary[]
  currentId: string
  pathOf: (id: string) => string
}

const shown = 12

/** Sheets of the notebook beside the open one, newest first; the open one is always among them. */
export function Spine({ notebook, notebookPath, entries, currentId, pathOf }: SpineProps) {
  const at = Math.max(
    0,
    entries.findIndex((entry) => entry.id === currentId),
  )
  const from = Math.max(0, Math.min(at - 3, entries.length - shown))
  const near = entries.slice(from, from + shown)
  const others = entries.length - near.length
  return (
    <aside className="hs-spine" aria-label={`Notebook ${notebook.number}`}>
      <h2>
        {notebook.number}
        <br />
        {notebook.title}
      </h2>
      <ol>
        {near.map((entry) => (
          <li key={entry.id}>
            <Link to={pathOf(entry.id)} aria-current={entry.id === currentId ? 'page' : undefined}>
              <span className="hs-fig">{sheetNumber(entry.number)}</span>
              <span>{entry.title}</span>
              <StateGlyph state={glyphOf(entry.phase)} wordless />
            </Link>
          </li>
        ))}
      </ol>
      <p className="hs-spine-more">
        <TextLink to={notebookPath}>
          {others > 0 ? `${others} other ${others === 1 ? 'sheet' : 'sheets'}` : 'The whole notebook'}
        </TextLink>
      </p>
    </aside>
  )
}

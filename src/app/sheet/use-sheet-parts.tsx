import { useMemo, useState } from 'react'
import { useNavigate } from 'react-router-dom'
import type { Entry } from '../../../server/contract/entries.ts'
import type { EditorParts, QuotableFigure } from '../../editor/editor-parts.ts'
import { CalculationBlock } from '../../features/calculations/calculation-block.tsx'
import { QuotedFigure } from '../../features/calculations/quoted-figure.tsx'
import '../../features/calculations/calculations.css'
import { figureInFull } from '../../lib/format-quantity.ts'
import { urlOf } from '../../lib/url-of.ts'

interface Asks {
  calculation: () => void
  picture: () => void
}

const nothing: Asks = { calculation: () => {}, picture: () => {} }

/** What the text of a sheet shows besides words: blocks, quoted figures, pictures, links. */
export function useSheetParts(entry: Entry, editable: boolean, asks: Asks = nothing) {
  const navigate = useNavigate()
  const [leaving, setLeaving] = useState<string | null>(null)
  const sealed = entry.state === 'sealed'
  const parts = useMemo<EditorParts>(
    () => ({
      calculation: (calculationId, placeActs, onSuccessor) => (
        <div id={calculationId} tabIndex={-1}>
          <CalculationBlock {...{ calculationId, editable, sealed, placeActs, onSuccessor }} />
        </div>
      ),
      quote: (calculationId, pointer) => <QuotedFigure calculationId={calculationId} pointer={pointer} />,
      imageAddress: (fileId) => urlOf('getFileContent', { id: fileId }),
      figures: figuresOf(entry),
      askForCalculation: asks.calculation,
      askForPicture: asks.picture,
      openLink: (href) => {
        if (href.startsWith('#'))
          document.querySelector(`[data-id="${CSS.escape(href.slice(1))}"]`)?.scrollIntoView()
        else if (href.startsWith('/')) void navigate(href)
        else setLeaving(href)
      },
    }),
    [entry, editable, sealed, asks, navigate],
  )
  return { parts, leaving, stay: () => setLeaving(null) }
}

function figuresOf(entry: Entry): QuotableFigure[] {
  // Of a label the newest calculation is offered: it took the place of those before.
  const newest = new Map(entry.calculations.map((calculation) => [calculation.label, calculation]))
  return [...newest.values()].flatMap(({ id, label, figures }) =>
    figures.map((figure) => ({
      calculationId: id,
      pointer: figure.pointer,
      calculation: label,
      name: figure.label,
      text: figureInFull(figure),
    })),
  )
}

import { useId, useMemo, useState, type KeyboardEvent, type PointerEvent } from 'react'
import type { Figure } from '../../server/contract/figure.ts'
import { TextButton } from '../ui/button.tsx'
import { Symbol } from '../ui/symbol.tsx'
import { XAxis, YAxis } from './axes.tsx'
import { layoutFigure, type FigureLayout } from './figure-layout.ts'
import { FigureTable } from './figure-table.tsx'
import { PanelView } from './panel-view.tsx'
import { nearest, readingAt, readSeries, type Reading } from './readout.ts'
import { useWidth } from './use-width.ts'

type FigurePlotProps = {
  figure: Figure
  /** Height of the heaviest panel, px; without it 232, on a phone 200. */
  height?: number
  /** A small plot beside other things: no read-out line and no data table. */
  plain?: boolean
}

/**
 * Draws a figure: axes off the data, points with error bars, the fit over its band, residuals on the same x scale.
 * Pointer or arrow keys read points out; the data table holds every number that is drawn.
 */
export function FigurePlot({ figure, height, plain = false }: FigurePlotProps) {
  const [stage, width] = useWidth<HTMLDivElement>(672)
  const [index, setIndex] = useState<number | null>(null)
  const [table, setTable] = useState(false)
  const layout = useMemo(() => layoutFigure(figure, width, height), [figure, width, height])
  const series = useMemo(() => readSeries(figure), [figure])
  const reading = series && index !== null ? readingAt(figure, series, index) : null

  function onPointerMove(event: PointerEvent<SVGSVGElement>) {
    if (!series) return
    const box = event.currentTarget.getBoundingClientRect()
    setIndex(nearest(series, layout.x.invert(event.clientX - box.left)))
  }

  function onKeyDown(event: KeyboardEvent) {
    const next = series && stepped(event, index, series.x.length)
    if (next === null) return
    event.preventDefault()
    setIndex(next)
  }

  return (
    <div className="hs-plot" ref={stage}>
      <div
        className="hs-plot-stage"
        role="img"
        aria-label={figure.description}
        aria-description={plain ? undefined : 'Arrow keys read out the points.'}
        tabIndex={plain ? undefined : 0}
        onKeyDown={plain ? undefined : onKeyDown}
        onBlur={() => setIndex(null)}
      >
        <svg
          width={layout.width}
          height={layout.height}
          viewBox={`0 0 ${layout.width} ${layout.height}`}
          aria-hidden
          onPointerMove={plain ? undefined : onPointerMove}
          onPointerLeave={plain ? undefined : () => setIndex(null)}
        >
          <Drawing figure={figure} layout={layout} />
          {reading && <Cursor reading={reading} layout={layout} />}
        </svg>
      </div>
      {!plain && (
        <div className="hs-readout">
          <output aria-live="polite">{reading && <ReadingWords reading={reading} />}</output>
          <TextButton aria-expanded={table} onClick={() => setTable(!table)}>
            Data table
          </TextButton>
        </div>
      )}
      {table && <FigureTable figure={figure} />}
    </div>
  )
}

/** Where an arrow key leads; null for other keys. Home and End go to the ends, Page Up and Down by a tenth. */
function stepped(event: KeyboardEvent, from: number | null, length: number): number | null {
  const last = length - 1
  const at = from ?? Math.floor(last / 2)
  const page = Math.max(1, Math.round(length / 10))
  const first = from === null ? 0 : 1
  const to: Record<string, number> = {
    ArrowLeft: at - first,
    ArrowRight: at + first,
    PageUp: at - page,
    PageDown: at + page,
    Home: 0,
    End: last,
  }
  const next = to[event.key]
  return next === undefined || length === 0 ? null : Math.min(last, Math.max(0, next))
}

function Drawing({ figure, layout }: { figure: Figure; layout: FigureLayout }) {
  const clip = useId()
  return (
    <>
      {layout.panels.map((placed, at) => (
        <g key={at}>
          <clipPath id={`${clip}-${at}`}>
            <rect
              x={layout.left - 1}
              y={placed.top - 2}
              width={layout.right - layout.left + 2}
              height={placed.height + 4}
            />
          </clipPath>
          <PanelView placed={placed} layout={layout} clip={`${clip}-${at}`} />
          <YAxis placed={placed} layout={layout} />
        </g>
      ))}
      <XAxis figure={figure} layout={layout} />
    </>
  )
}

function Cursor({ reading, layout }: { reading: Reading; layout: FigureLayout }) {
  const placed = layout.panels[0]
  if (!placed) return null
  const x = layout.x(reading.x)
  return (
    <>
      <path className="hs-cursor" d={`M${x} ${placed.top}V${layout.axisTop}`} />
      <circle className="hs-cursor-point" cx={x} cy={placed.y(reading.y)} r="5" />
    </>
  )
}

function ReadingWords({ reading }: { reading: Reading }) {
  return (
    <span className="hs-readout-words">
      {reading.parts.map((part) => (
        <span key={part.text}>
          {part.symbol && <Symbol>{part.symbol}</Symbol>}
          <span className="hs-fig">{part.text}</span>
        </span>
      ))}
    </span>
  )
}

import { memo } from 'react'
import type { FigurePanel, FigureSeries } from '../../server/contract/figure.ts'
import type { FigureLayout, PanelLayout, Scale } from './figure-layout.ts'
import { isOpen, marksPath } from './marks.ts'
import { bandPath, definedPoints, errorBarPath, linePath, overflowPath, stemsPath } from './series-path.ts'

const round = (value: number) => Math.round(value * 100) / 100

/** Data of one panel: ground, bands, references, then marks, so that what was measured lies on top but under the fit. */
export const PanelView = memo(function PanelView({
  placed,
  layout,
  clip,
}: {
  placed: PanelLayout
  layout: FigureLayout
  clip: string
}) {
  const { panel, y } = placed
  const { x } = layout
  const bands = panel.series.filter((series) => series.mark === 'band')
  const others = panel.series.filter((series) => series.mark !== 'band')
  return (
    <>
      <Ground placed={placed} layout={layout} />
      <g clipPath={`url(#${clip})`}>
        {bands.map((series) => (
          <path key={series.label} className="hs-band" d={bandPath(series, x, y)} />
        ))}
      </g>
      <References panel={panel} placed={placed} layout={layout} />
      {others.map((series) => (
        <SeriesView key={series.label} series={series} x={x} y={y} clip={clip} lines={countLines(panel)} />
      ))}
    </>
  )
})

function countLines(panel: FigurePanel): number {
  return panel.series.filter((series) => /^channel/.test(series.role) && series.mark !== 'points').length
}

function Ground({ placed, layout }: { placed: PanelLayout; layout: FigureLayout }) {
  const { panel, y } = placed
  if (!panel.ground) return null
  const [low, high] = panel.ground
  const top = round(y(high))
  return (
    <rect
      className="hs-ground-band"
      x={layout.left}
      y={top}
      width={layout.right - layout.left}
      height={Math.max(0, round(y(low)) - top)}
    />
  )
}

function References({
  panel,
  placed,
  layout,
}: {
  panel: FigurePanel
  placed: PanelLayout
  layout: FigureLayout
}) {
  const { top, height, y, strip } = placed
  const { left, right, x } = layout
  return (
    <>
      {panel.references.map((each) => {
        const at = round(each.axis === 'y' ? y(each.at) : x(each.at))
        const inside =
          each.axis === 'y' ? at >= top - 1 && at <= top + height + 1 : at >= left - 1 && at <= right + 1
        if (!inside) return null
        return (
          <g key={`${each.axis}${each.at}${each.label}`}>
            <path
              className={`hs-reference hs-reference-${each.style}`}
              d={each.axis === 'y' ? `M${left} ${at}H${right}` : `M${at} ${top}V${top + height}`}
            />
            {each.label && !strip && (
              <text
                className="hs-plot-note"
                x={each.axis === 'y' ? right : at + 4}
                y={each.axis === 'y' ? at - 5 : top + 10}
                textAnchor={each.axis === 'y' ? 'end' : 'start'}
              >
                {each.label}
              </text>
            )}
          </g>
        )
      })}
    </>
  )
}

type SeriesProps = { series: FigureSeries; x: Scale; y: Scale; clip: string; lines: number }

function SeriesView({ series, x, y, clip, lines }: SeriesProps) {
  if (series.mark === 'points') return <Points series={series} x={x} y={y} />
  if (series.mark === 'stems') {
    return <path className={`hs-series hs-role-${series.role} hs-stems`} d={stemsPath(series, x, y)} />
  }
  const marked = lines > 1 && series.role.startsWith('channel')
  return (
    <g clipPath={`url(#${clip})`}>
      {series.low && <path className="hs-error-bars" d={errorBarPath(series, x, y)} />}
      <path className={`hs-series hs-role-${series.role}`} d={linePath(series, x, y)} />
      {marked && <LineMarks series={series} x={x} y={y} />}
    </g>
  )
}

function Points({ series, x, y }: Omit<SeriesProps, 'clip' | 'lines'>) {
  const [a = 0, b = 0] = y.range()
  const seen = definedPoints(series)
    .map((point) => ({ x: x(point.x), y: y(point.y) }))
    .filter((point) => point.y >= Math.min(a, b) - 0.5 && point.y <= Math.max(a, b) + 0.5)
  const size = seen.length > 300 ? 1.4 : seen.length > 120 ? 1.9 : 2.3
  return (
    <>
      <path className="hs-error-bars" d={errorBarPath(series, x, y)} />
      <path className={markClass(series)} d={marksPath(series.role, seen, size)} />
      <path className="hs-overflow" d={overflowPath(series, x, y)} />
    </>
  )
}

/** On lines of several channels a marker every sixth of the width tells them apart without hue. */
function LineMarks({ series, x, y }: Omit<SeriesProps, 'clip' | 'lines'>) {
  const points = definedPoints(series)
  const chosen = [1, 3, 5, 7, 9, 11].flatMap(
    (part) => points[Math.round(((points.length - 1) * part) / 12)] ?? [],
  )
  return (
    <path
      className={markClass(series)}
      d={marksPath(
        series.role,
        chosen.map((point) => ({ x: x(point.x), y: y(point.y) })),
        3.4,
      )}
    />
  )
}

function markClass(series: FigureSeries): string {
  return `hs-mark hs-mark-${series.role}${isOpen(series.role) ? ' hs-mark-open' : ''}`
}

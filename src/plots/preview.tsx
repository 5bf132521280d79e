import { scaleLinear } from 'd3-scale'
import { marksPath } from './marks.ts'

export type PreviewProps = {
  x: number[]
  y: (number | null)[]
  /** How the figure reads at a glance: a curve, a comb of peaks, or points of a scan. */
  kind?: 'line' | 'peaks' | 'points'
  /** The reference line, for example 1; null for none. */
  reference?: number | null
  label?: string
}

const width = 108
const height = 30

/** A figure without axes, 108 × 30, for a row of a table. The row names it; with a label it speaks for itself. */
export function Preview({ x, y, kind = 'line', reference = null, label }: PreviewProps) {
  const points = x.flatMap((at, index) => {
    const value = y[index]
    return value === null || value === undefined ? [] : [{ x: at, y: value }]
  })
  const values = points.map((point) => point.y)
  const floor = Math.min(0, ...values)
  const ceiling = Math.max(reference ?? 0, ...values) || 1
  const across = scaleLinear([x[0] ?? 0, x[x.length - 1] ?? 1], [2, width - 2])
  const up = scaleLinear([floor, ceiling], [height - 2, 4])
  const placed = points.map((point) => ({ x: across(point.x), y: up(point.y) }))
  return (
    <svg
      className="hs-preview"
      width={width}
      height={height}
      viewBox={`0 0 ${width} ${height}`}
      role={label ? 'img' : undefined}
      aria-label={label}
      aria-hidden={label ? undefined : true}
    >
      {reference !== null && (
        <path className="hs-reference hs-reference-dashed" d={`M0 ${up(reference)}H${width}`} />
      )}
      {kind === 'points' && <path className="hs-preview-point" d={marksPath('coincidence', placed, 1.4)} />}
      {kind === 'line' && <path className="hs-preview-line" d={`M${join(thinned(placed))}`} />}
      {kind === 'peaks' && <path className="hs-preview-line" d={peaks(placed, up(floor))} />}
    </svg>
  )
}

type Place = { x: number; y: number }

const join = (places: Place[]) =>
  places.map((place) => `${place.x.toFixed(1)} ${place.y.toFixed(1)}`).join('L') || '0 0'

/** No more points than pixels: a thousand bins would draw a grey band. */
function thinned(places: Place[]): Place[] {
  const step = Math.max(1, Math.ceil(places.length / 54))
  if (step === 1) return places
  const groups = Array.from({ length: Math.ceil(places.length / step) }, (_, at) =>
    places.slice(at * step, (at + 1) * step),
  )
  return groups.map((group) => ({
    x: mean(group.map((place) => place.x)),
    y: mean(group.map((place) => place.y)),
  }))
}

const mean = (values: number[]) => values.reduce((sum, value) => sum + value, 0) / values.length

function peaks(places: Place[], base: number): string {
  return places
    .map((place) => `M${place.x - 4} ${base}L${place.x} ${place.y}L${place.x + 4} ${base}`)
    .join('')
}

import type { FigureSeries } from '../../contract/figure.ts'
import { coordinate, element, line, pathThrough } from './markup.ts'
import type { Scale } from './scales.ts'
import { BAND, ERROR_BAR, PAPER, STYLES, type SeriesStyle } from './style.ts'

export interface Frame {
  x: Scale
  y: Scale
  left: number
  right: number
  top: number
  bottom: number
}

/** Above this many points error bars have no caps. */
const CAPS_UP_TO = 40
const CAP = 3
/** A pattern line carries a marker every sixth of the width. */
const MARKERS_A_WIDTH = 6

type Point = readonly [number, number]

/** One series as SVG, in the style of its role. */
export function drawSeries(series: FigureSeries, frame: Frame): string {
  const style = STYLES[series.role]
  switch (series.mark) {
    case 'band':
      return band(series, frame)
    case 'line':
      return lineWithMarkers(pointsOf(series, frame), series, style, frame)
    case 'steps':
      return lineWithMarkers(stepsOf(series, frame), series, style, frame)
    case 'stems':
      return stems(series, frame, style)
    case 'points':
      return errorBars(series, frame) + markers(series, frame, style)
  }
}

const pointsOf = ({ x, y }: FigureSeries, frame: Frame): (Point | null)[] =>
  x.map((at, i) => (y[i] === null || y[i] === undefined ? null : ([frame.x(at), frame.y(y[i])] as const)))

/** Level from each x to the next. */
function stepsOf(series: FigureSeries, frame: Frame): (Point | null)[] {
  const points = pointsOf(series, frame)
  return points.flatMap((point, i): (Point | null)[] => {
    const next = points[i + 1]
    return point && next ? [point, [next[0], point[1]]] : [point]
  })
}

function band({ x, low, high }: FigureSeries, frame: Frame): string {
  const ends = x.flatMap((at, i) => {
    const from = low?.[i]
    const to = high?.[i]
    return typeof from === 'number' && typeof to === 'number'
      ? [{ at: frame.x(at), from: frame.y(from), to: frame.y(to) }]
      : []
  })
  if (ends.length < 2) return ''
  const there = ends.map(({ at, to }) => [at, to] as const)
  const back = ends.map(({ at, from }) => [at, from] as const).toReversed()
  return element('path', { d: `${pathThrough([...there, ...back])}Z`, fill: BAND, stroke: 'none' })
}

function lineWithMarkers(
  points: (Point | null)[],
  series: FigureSeries,
  style: SeriesStyle,
  frame: Frame,
): string {
  const path = element('path', {
    d: pathThrough(points),
    fill: 'none',
    stroke: style.stroke,
    'stroke-width': style.width,
    'stroke-dasharray': style.dash,
    'stroke-linejoin': 'round',
  })
  if (!series.role.startsWith('channel')) return path
  const seen = points.filter((p) => p !== null)
  const spots = Array.from({ length: MARKERS_A_WIDTH }, (_, i) => {
    const at = frame.left + ((i + 0.5) * (frame.right - frame.left)) / MARKERS_A_WIDTH
    return seen.findLast((p) => p[0] <= at) ?? seen[0]
  })
  return path + spots.flatMap((p) => (p === undefined ? [] : [markerAt(p[0], p[1], style)])).join('')
}

function stems(series: FigureSeries, frame: Frame, style: SeriesStyle): string {
  const zero = frame.y(0)
  return series.x
    .flatMap((at, i) => {
      const value = series.y[i]
      if (value === null || value === undefined) return []
      const x = frame.x(at)
      const { y, over } = clipped(frame.y(value), frame)
      const stem = line(x, zero, x, y, { stroke: style.stroke, 'stroke-width': 1 })
      return [
        over === 0
          ? stem + element('circle', { cx: x, cy: y, r: 1.3, fill: style.stroke })
          : stem + arrowhead(x, y, over),
      ]
    })
    .join('')
}

function errorBars({ x, y, low, high }: FigureSeries, frame: Frame): string {
  if (low === null || high === null) return ''
  const few = x.length <= CAPS_UP_TO
  return x
    .flatMap((at, i) => {
      const from = low[i]
      const to = high[i]
      if (typeof from !== 'number' || typeof to !== 'number') return []
      const px = frame.x(at)
      const bottom = clipped(frame.y(from), frame)
      const top = clipped(frame.y(to), frame)
      // Nothing counted: the bar begins at the value, and its upper end is always capped.
      const onlyAbove = from === y[i]
      const cap = (py: number) => line(px - CAP, py, px + CAP, py, { stroke: ERROR_BAR, 'stroke-width': 1.1 })
      const caps =
        (top.over === 0 && (few || onlyAbove) ? cap(top.y) : '') +
        (bottom.over === 0 && few && !onlyAbove ? cap(bottom.y) : '')
      return [line(px, bottom.y, px, top.y, { stroke: ERROR_BAR, 'stroke-width': 1.1 }) + caps]
    })
    .join('')
}

function markers({ x, y }: FigureSeries, frame: Frame, style: SeriesStyle): string {
  return x
    .flatMap((at, i) => {
      const value = y[i]
      if (value === null || value === undefined) return []
      const place = clipped(frame.y(value), frame)
      return [
        place.over === 0
          ? markerAt(frame.x(at), place.y, style)
          : arrowhead(frame.x(at), place.y, place.over),
      ]
    })
    .join('')
}

/** A place inside the frame; `over` is -1 above it and 1 below it. */
function clipped(y: number, { top, bottom }: Frame): { y: number; over: -1 | 0 | 1 } {
  if (y < top - 0.01) return { y: top, over: -1 }
  if (y > bottom + 0.01) return { y: bottom, over: 1 }
  return { y, over: 0 }
}

/** A point beyond the frame is an arrowhead at its edge. */
function arrowhead(x: number, y: number, over: number): string {
  const tip = y
  const base = y - 5 * over
  const d = `M${coordinate(x)} ${coordinate(tip)}L${coordinate(x - 3)} ${coordinate(base)}L${coordinate(x + 3)} ${coordinate(base)}Z`
  return element('path', { d, fill: ERROR_BAR })
}

export function markerAt(x: number, y: number, { marker, filled, size, stroke }: SeriesStyle): string {
  const look = { fill: filled ? stroke : PAPER, stroke, 'stroke-width': 1.1 }
  if (marker === 'circle') return element('circle', { cx: x, cy: y, r: size, ...look })
  const corners: Record<Exclude<SeriesStyle['marker'], 'circle'>, Point[]> = {
    square: [
      [-1, -1],
      [1, -1],
      [1, 1],
      [-1, 1],
    ],
    triangle: [
      [0, -1.15],
      [1.1, 0.9],
      [-1.1, 0.9],
    ],
    diamond: [
      [0, -1.3],
      [1.3, 0],
      [0, 1.3],
      [-1.3, 0],
    ],
  }
  const outline = corners[marker].map(([dx, dy]) => [x + dx * size, y + dy * size] as const)
  return element('path', { d: `${pathThrough(outline)}Z`, ...look })
}

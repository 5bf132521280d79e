import { area, curveLinear, curveStepAfter, line } from 'd3-shape'
import type { FigureSeries } from '../../server/contract/figure.ts'
import type { Scale } from './figure-layout.ts'

type Point = { x: number; y: number; low: number | null; high: number | null }

const round = (value: number) => Math.round(value * 100) / 100

/** Points of a series that have a value, in data units. */
export function definedPoints(series: FigureSeries): Point[] {
  return series.x.flatMap((x, at) => {
    const y = series.y[at]
    return y === null || y === undefined
      ? []
      : [{ x, y, low: series.low?.[at] ?? null, high: series.high?.[at] ?? null }]
  })
}

/** A line, in one path however many points; a null is a gap. */
export function linePath(series: FigureSeries, x: Scale, y: Scale): string {
  const path = line<number>()
    .defined((at) => (series.y[at] ?? null) !== null)
    .x((at) => x(series.x[at] ?? 0))
    .y((at) => y(series.y[at] ?? 0))
    .curve(series.mark === 'steps' ? curveStepAfter : curveLinear)
  return path(series.x.keys()) ?? ''
}

/** The band between low and high. */
export function bandPath(series: FigureSeries, x: Scale, y: Scale): string {
  const { low, high } = series
  if (!low || !high) return ''
  const path = area<number>()
    .defined((at) => (low[at] ?? null) !== null && (high[at] ?? null) !== null)
    .x((at) => x(series.x[at] ?? 0))
    .y0((at) => y(low[at] ?? 0))
    .y1((at) => y(high[at] ?? 0))
  return path(series.x.keys()) ?? ''
}

/** Stems from zero, cut at the frame. */
export function stemsPath(series: FigureSeries, x: Scale, y: Scale): string {
  const zero = round(y(0))
  return definedPoints(series)
    .map((point) => `M${round(x(point.x))} ${zero}V${round(within(y(point.y), y))}`)
    .join('')
}

/** Error bars in one path. Caps of 6 px below 40 points; above that they would touch each other. */
export function errorBarPath(series: FigureSeries, x: Scale, y: Scale): string {
  const capped = series.x.length < 40
  return series.x
    .map((at, index) => {
      const low = series.low?.[index] ?? null
      const high = series.high?.[index] ?? null
      if (low === null || high === null) return ''
      const across = round(x(at))
      const bottom = round(within(y(low), y))
      const top = round(within(y(high), y))
      const caps = capped ? `M${round(across - 3)} ${bottom}h6M${round(across - 3)} ${top}h6` : ''
      return `M${across} ${bottom}V${top}${caps}`
    })
    .join('')
}

/** Keeps a pixel inside the frame of its scale. */
export function within(pixel: number, y: Scale): number {
  const [a = 0, b = 0] = y.range()
  return Math.min(Math.max(pixel, Math.min(a, b)), Math.max(a, b))
}

/** Arrowheads at the frame for points that lie beyond it. */
export function overflowPath(series: FigureSeries, x: Scale, y: Scale): string {
  const [a = 0, b = 0] = y.range()
  const top = Math.min(a, b)
  const bottom = Math.max(a, b)
  return definedPoints(series)
    .map((point) => {
      const pixel = y(point.y)
      const across = round(x(point.x))
      if (pixel < top - 0.5) return `M${across - 3.5} ${top + 6}h7l-3.5-6Z`
      if (pixel > bottom + 0.5) return `M${across - 3.5} ${bottom - 6}h7l-3.5 6Z`
      return ''
    })
    .join('')
}

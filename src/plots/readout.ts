import { bisectCenter } from 'd3-array'
import type { Figure, FigureSeries } from '../../server/contract/figure.ts'
import { axisNumber, readoutNumber, withUncertainty } from './numbers.ts'

export type Reading = {
  x: number
  y: number
  /** One figure each: a symbol in the short notation of axes, or null, and what it is. */
  parts: { symbol: string | null; text: string }[]
}

/** The series a reading is taken from: the first that was measured, else the first of all. */
export function readSeries(figure: Figure): FigureSeries | null {
  const all = figure.panels[0]?.series ?? []
  return (
    all.find((series) => series.mark === 'points' || series.mark === 'steps') ??
    all.find((series) => series.mark !== 'band') ??
    null
  )
}

/** Index of the point nearest to a place on the x axis. */
export function nearest(series: FigureSeries, x: number): number {
  return Math.max(0, bisectCenter(series.x, x))
}

const unitOf = (unit: string) => (unit && unit !== '1' ? ` ${unit}` : '')

/**
 * One point: x, y ± error, and the counts of the same row of the data table where it has a column of counts.
 * Null where the series has no value.
 */
export function readingAt(figure: Figure, series: FigureSeries, index: number): Reading | null {
  const x = series.x[index]
  const y = series.y[index] ?? null
  const panel = figure.panels[0]
  if (x === undefined || y === null || !panel) return null
  const low = series.low?.[index] ?? null
  const high = series.high?.[index] ?? null
  const counts = countsAt(figure, x)
  return {
    x,
    y,
    parts: [
      { symbol: figure.x.symbol ?? figure.x.label, text: ` = ${readoutNumber(x)}${unitOf(figure.x.unit)}` },
      {
        symbol: panel.y.symbol ?? panel.y.label,
        text: ` = ${valueWithError(y, low, high)}${unitOf(panel.y.unit)}`,
      },
      ...(counts === null ? [] : [{ symbol: null, text: counts }]),
    ],
  }
}

/** Symmetric errors as ±; lopsided ones (few counts) with both ends. */
function valueWithError(y: number, low: number | null, high: number | null): string {
  if (low === null || high === null) return readoutNumber(y)
  const down = y - low
  const up = high - y
  const even = Math.abs(up - down) <= 0.02 * Math.max(up, down)
  return even
    ? withUncertainty(y, (up + down) / 2)
    : `${readoutNumber(y)} (${readoutNumber(low)} to ${readoutNumber(high)})`
}

function countsAt(figure: Figure, x: number): string | null {
  const { columns, rows } = figure.table
  const column = columns.findIndex(
    (each) => /^(counts?|n)$/i.test(each.name) || /\bcounts?$/i.test(each.name),
  )
  if (column < 0) return null
  const row = rows.find(
    (each) => typeof each[0] === 'number' && Math.abs(each[0] - x) <= 1e-9 * (1 + Math.abs(x)),
  )
  const counts = row?.[column]
  return counts === null || counts === undefined ? null : `${axisNumber(String(counts))} counts`
}

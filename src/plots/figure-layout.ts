import { extent } from 'd3-array'
import { scaleLinear, scaleLog, type ScaleLinear, type ScaleLogarithmic } from 'd3-scale'
import type { Figure, FigureAxis, FigurePanel } from '../../server/contract/figure.ts'
import { axisNumber, powerOfTen } from './numbers.ts'

export type Scale = ScaleLinear<number, number> | ScaleLogarithmic<number, number>

/** Axes stand off the data by this much, in px (look of the product, section 6). */
export const axisGap = 8
const stripHeight = 54
const topHeight = 14
const betweenPanels = 14
const footHeight = 46

export type PanelLayout = { panel: FigurePanel; top: number; height: number; y: Scale; strip: boolean }
export type FigureLayout = {
  width: number
  height: number
  /** Left and right end of the data, px. */
  left: number
  right: number
  x: Scale
  /** Where the x axis runs. */
  axisTop: number
  panels: PanelLayout[]
}

/** Places panels over one common x scale. Pure: the same figure and width give the same layout. */
export function layoutFigure(figure: Figure, width: number, mainHeight?: number): FigureLayout {
  const narrow = width < 480
  const left = (narrow ? 32 : 42) + axisGap
  const right = Math.max(left + 60, width - 14)
  const x = scaleOf(figure.x, xExtent(figure), [left, right], false)
  const main = mainHeight ?? (narrow ? 200 : 232)
  let top = topHeight
  const heaviest = Math.max(...figure.panels.map((panel) => panel.weight), 1e-9)
  const panels = figure.panels.map((panel) => {
    const strip = figure.panels.length > 1 && panel.weight < 0.5 * heaviest
    const height = strip ? stripHeight : Math.round((main * panel.weight) / heaviest)
    const placed = {
      panel,
      top,
      height,
      strip,
      y: scaleOf(panel.y, yExtent(panel), [top + height, top], true),
    }
    top += height + betweenPanels
    return placed
  })
  const axisTop = top - betweenPanels + axisGap
  return { width, height: axisTop + footHeight - axisGap, left, right, x, axisTop, panels }
}

type Ends = [number, number]

function scaleOf(axis: FigureAxis, data: Ends, range: Ends, nice: boolean): Scale {
  if (axis.scale === 'log') {
    const [low, high] = axis.domain ?? data
    const scale = scaleLog([low > 0 ? low : Math.max(high, 1) / 1e4, high > 0 ? high : 1], range)
    return nice && !axis.domain ? scale.nice() : scale
  }
  const scale = scaleLinear(axis.domain ?? widen(data), range)
  return nice && !axis.domain ? scale.nice() : scale
}

/** A single value needs some room about it, or the scale has no length. */
function widen([low, high]: Ends): Ends {
  if (low !== high) return [low, high]
  const room = Math.abs(low) * 0.1 || 1
  return [low - room, high + room]
}

function xExtent(figure: Figure): Ends {
  return ends(figure.panels.flatMap((panel) => panel.series.flatMap((series) => extentOf(series.x))))
}

function yExtent(panel: FigurePanel): Ends {
  const seen = panel.series.flatMap((series) => [
    ...extentOf(series.y),
    ...extentOf(series.low ?? []),
    ...extentOf(series.high ?? []),
  ])
  const references = panel.references.filter((each) => each.axis === 'y').map((each) => each.at)
  const stems = panel.series.some((series) => series.mark === 'stems') ? [0] : []
  return ends([...seen, ...references, ...stems, ...(panel.ground ?? [])])
}

function extentOf(values: (number | null)[]): number[] {
  const [low, high] = extent(
    values.filter((value): value is number => value !== null && Number.isFinite(value)),
  )
  return low === undefined || high === undefined ? [] : [low, high]
}

function ends(values: number[]): Ends {
  const [low, high] = extent(values)
  return low === undefined || high === undefined ? [0, 1] : [low, high]
}

export type Tick = { at: number; major: boolean; text: string | null }

/** Ticks of an axis: labelled major ones and unlabelled minor ones between them. */
export function ticksOf(scale: Scale, axis: FigureAxis, wanted: number): Tick[] {
  return axis.scale === 'log' ? logTicks(scale, wanted) : linearTicks(scale, wanted)
}

function linearTicks(scale: Scale, wanted: number): Tick[] {
  const major = scale.ticks(wanted)
  const format = scale.tickFormat(wanted)
  const minor = scale
    .ticks(wanted * 5)
    .filter((at) => !major.some((each) => Math.abs(each - at) < 1e-9 * (1 + Math.abs(at))))
  return [
    ...major.map((at) => ({ at, major: true, text: axisNumber(format(at).replaceAll(',', '')) })),
    ...(minor.length <= 60 ? minor.map((at) => ({ at, major: false, text: null })) : []),
  ]
}

function logTicks(scale: Scale, wanted: number): Tick[] {
  const all = scale.ticks()
  const decades = all.filter((at) => Number.isInteger(Number(Math.log10(at).toFixed(9))))
  const labelled = decades.length >= 2 ? decades : scale.ticks(wanted)
  return all.map((at) => ({
    at,
    major: labelled.includes(at),
    text: labelled.includes(at) ? logText(at) : null,
  }))
}

function logText(at: number): string {
  if (at >= 0.01 && at < 1e4) return String(Number(at.toPrecision(3)))
  const power = Math.floor(Math.log10(at) + 1e-9)
  const factor = Number((at / 10 ** power).toPrecision(3))
  return `${factor === 1 ? '' : `${factor}×`}${powerOfTen(power)}`
}

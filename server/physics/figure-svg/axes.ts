import type { FigureAxis, FigurePanel } from '../../contract/figure.ts'
import { element, escapeText, line } from './markup.ts'
import type { Frame } from './marks.ts'
import { ticksOf } from './scales.ts'
import { FIGURE_FONT, INK, PAPER, QUIET, REFERENCE_DASH, SYMBOL_FONT } from './style.ts'

/** Axes stand this far off the data. */
export const AXIS_GAP = 8
const MAJOR = 6
const MINOR = 3
const FONT_SIZE = 11
/** A residual strip is labelled at every second sigma. */
const STRIP_TICKS = 4

const stroke = { stroke: INK, 'stroke-width': 1 }

function label(x: number, y: number, text: string, anchor: 'start' | 'middle' | 'end'): string {
  const attributes = {
    x,
    y,
    'font-family': FIGURE_FONT,
    'font-size': FONT_SIZE,
    fill: INK,
    'text-anchor': anchor,
  }
  return element('text', attributes, escapeText(text))
}

/** "delay τ / ns", the symbol in italic; a pure number has no unit, a logarithmic axis says so. */
export function axisTitle(axis: FigureAxis, x: number, y: number, anchor: 'start' | 'end'): string {
  const symbol =
    axis.symbol === null
      ? ''
      : element(
          'tspan',
          { 'font-family': SYMBOL_FONT, 'font-style': 'italic', 'font-size': 13 },
          escapeText(axis.symbol),
        )
  const words = [escapeText(axis.label), symbol].filter((part) => part !== '').join(' ')
  const unit = axis.unit === '1' ? '' : ` / ${escapeText(axis.unit)}`
  const log = axis.scale === 'log' ? ', log' : ''
  const attributes = {
    x,
    y,
    'font-family': FIGURE_FONT,
    'font-size': FONT_SIZE,
    fill: INK,
    'text-anchor': anchor,
  }
  return element('text', attributes, `${words}${unit}${log}`)
}

/** The axis below a panel; labels only where it is the lowest panel. */
export function horizontalAxis(frame: Frame, labelled: boolean): string {
  const y = frame.bottom + AXIS_GAP
  const { major, minor } = ticksOf(frame.x, Math.max(2, Math.floor((frame.right - frame.left) / 90)))
  return [
    line(frame.left, y, frame.right, y, stroke),
    ...minor.map((at) => line(frame.x(at), y, frame.x(at), y + MINOR, stroke)),
    ...major.map(({ at }) => line(frame.x(at), y, frame.x(at), y + MAJOR, stroke)),
    ...(labelled
      ? major.map(({ at, label: text }) => label(frame.x(at), y + MAJOR + FONT_SIZE + 1, text, 'middle'))
      : []),
  ].join('')
}

/** The axis at the left of a panel. */
export function verticalAxis(frame: Frame): string {
  const x = frame.left - AXIS_GAP
  const { major, minor } = ticksOf(
    frame.y,
    Math.max(STRIP_TICKS, Math.floor((frame.bottom - frame.top) / 45)),
  )
  return [
    line(x, frame.top, x, frame.bottom, stroke),
    ...minor.map((at) => line(x - MINOR, frame.y(at), x, frame.y(at), stroke)),
    ...major.map(({ at }) => line(x - MAJOR, frame.y(at), x, frame.y(at), stroke)),
    ...major.map(({ at, label: text }) => label(x - MAJOR - 3, frame.y(at) + 4, text, 'end')),
  ].join('')
}

type Reference = FigurePanel['references'][number]

/** Meaningful lines only: levels, limits, zero delay. */
export function referenceLine(reference: Reference, frame: Frame): string {
  const dash = { stroke: QUIET, 'stroke-width': 1, 'stroke-dasharray': REFERENCE_DASH[reference.style] }
  if (reference.axis === 'x') {
    const x = frame.x(reference.at)
    if (x < frame.left || x > frame.right) return ''
    return line(x, frame.top, x, frame.bottom, dash)
  }
  const y = frame.y(reference.at)
  if (y < frame.top || y > frame.bottom) return ''
  return line(frame.left, y, frame.right, y, dash)
}

/** The words of a level, above its line at the right, outlined in paper so that data never touches them. */
export function referenceWords({ axis, at, label: text }: Reference, frame: Frame): string {
  const y = frame.y(at)
  if (axis === 'x' || text === '' || y < frame.top || y > frame.bottom) return ''
  const outline = { stroke: PAPER, 'stroke-width': 4, 'stroke-linejoin': 'round', 'paint-order': 'stroke' }
  return element('g', outline, label(frame.right, y - 4, text, 'end'))
}

import type { Figure, FigurePanel } from '../../contract/figure.ts'
import { axisTitle, AXIS_GAP, horizontalAxis, referenceLine, referenceWords, verticalAxis } from './axes.ts'
import { element, escapeText } from './markup.ts'
import { drawSeries, markerAt, type Frame } from './marks.ts'
import { scaleOf } from './scales.ts'
import { FIGURE_FONT, GROUND, INK, PAPER, STYLES } from './style.ts'

const WIDTH = 720
const LEFT = 66
const RIGHT = 16
const TOP = 30
const BOTTOM = 52
const PLOT_HEIGHT = 270
const PANEL_GAP = 26
const STRIP_HEIGHT = 54

/**
 * A figure as a standalone SVG for files and print: black and greys, patterns and markers, no style sheet and no script.
 * The same figure always gives the same bytes.
 */
export function renderSvg(figure: Figure): string {
  const frames = framesOf(figure)
  const last = frames[frames.length - 1]!
  const height = last.bottom + BOTTOM
  const body = figure.panels.map((panel, i) => drawPanel(panel, frames[i]!, i === frames.length - 1)).join('')
  const content = [
    element('title', { id: 'figure-title' }, escapeText(figure.title)),
    element('desc', { id: 'figure-description' }, escapeText(figure.description)),
    element('rect', { x: 0, y: 0, width: WIDTH, height, fill: PAPER }),
    legend(figure),
    body,
    axisTitle(figure.x, last.right, last.bottom + AXIS_GAP + 36, 'end'),
  ].join('')
  const attributes = {
    xmlns: 'http://www.w3.org/2000/svg',
    viewBox: `0 0 ${WIDTH} ${height}`,
    width: WIDTH,
    height,
    role: 'img',
    'aria-labelledby': 'figure-title figure-description',
  }
  return `<?xml version="1.0" encoding="UTF-8"?>\n${element('svg', attributes, content)}\n`
}

/** Panels one above the other: the heaviest has the full height, the others are strips of their share. */
function framesOf(figure: Figure): Frame[] {
  const heaviest = Math.max(...figure.panels.map((p) => p.weight))
  const numbersX = figure.panels.flatMap((p) => p.series.flatMap((s) => s.x))
  let top = TOP
  return figure.panels.map((panel) => {
    const height = Math.max(STRIP_HEIGHT, (PLOT_HEIGHT * panel.weight) / heaviest)
    const bottom = top + height
    const numbersY = panel.series
      .flatMap((s) => [...s.y, ...(s.low ?? []), ...(s.high ?? [])])
      .filter((y) => y !== null)
    const frame: Frame = {
      x: scaleOf(figure.x, numbersX, LEFT, WIDTH - RIGHT),
      y: scaleOf(panel.y, numbersY, bottom, top),
      left: LEFT,
      right: WIDTH - RIGHT,
      top,
      bottom,
    }
    top = bottom + AXIS_GAP + PANEL_GAP
    return frame
  })
}

function drawPanel(panel: FigurePanel, frame: Frame, isLast: boolean): string {
  const ground =
    panel.ground === null
      ? ''
      : element('rect', {
          x: frame.left,
          y: frame.y(panel.ground[1]),
          width: frame.right - frame.left,
          height: frame.y(panel.ground[0]) - frame.y(panel.ground[1]),
          fill: GROUND,
        })
  return element(
    'g',
    {},
    [
      ground,
      ...panel.series.filter((s) => s.mark === 'band').map((s) => drawSeries(s, frame)),
      ...panel.references.map((reference) => referenceLine(reference, frame)),
      // Data over the fit would hide it, so the fit comes last.
      ...panel.series.filter((s) => s.mark !== 'band' && s.role !== 'fit').map((s) => drawSeries(s, frame)),
      ...panel.series.filter((s) => s.mark !== 'band' && s.role === 'fit').map((s) => drawSeries(s, frame)),
      ...panel.references.map((reference) => referenceWords(reference, frame)),
      horizontalAxis(frame, isLast),
      verticalAxis(frame),
      axisTitle(panel.y, frame.left - AXIS_GAP, frame.top - 10, 'start'),
    ].join(''),
  )
}

/** Samples of the marked lines at the top right, where there is more than one channel. */
function legend(figure: Figure): string {
  const channels = figure.panels[0]!.series.filter((s) => s.role.startsWith('channel'))
  if (channels.length < 2) return ''
  const width = 112
  return channels
    .map((series, i) => {
      const x = WIDTH - RIGHT - (channels.length - i) * width
      const style = STYLES[series.role]
      const text = { x: x + 34, y: 16, 'font-family': FIGURE_FONT, 'font-size': 11, fill: INK }
      return (
        element('line', {
          x1: x,
          y1: 12,
          x2: x + 28,
          y2: 12,
          stroke: style.stroke,
          'stroke-width': style.width,
          'stroke-dasharray': style.dash,
        }) +
        markerAt(x + 14, 12, style) +
        element('text', text, escapeText(series.label))
      )
    })
    .join('')
}

import type { FigureSeries } from '../../contract/figure.ts'

/** Print: black and greys; a channel is told by pattern and marker, never by hue (look.md sections 6 and 9). */
export const INK = '#000000'
export const QUIET = '#444444'
export const ERROR_BAR = '#777777'
export const BAND = '#d8d8d8'
export const GROUND = '#eeeeee'
export const PAPER = '#ffffff'

export const FIGURE_FONT = "'Spline Sans Mono Variable', 'Spline Sans Mono', monospace"
export const SYMBOL_FONT = "'Source Serif 4 Variable', 'Source Serif 4', serif"

export type MarkerShape = 'circle' | 'square' | 'triangle' | 'diamond'

export interface SeriesStyle {
  stroke: string
  width: number
  dash?: string
  marker: MarkerShape
  filled: boolean
  size: number
}

const channel = (marker: MarkerShape, filled: boolean, dash?: string): SeriesStyle => ({
  stroke: INK,
  width: 1.6,
  ...(dash === undefined ? {} : { dash }),
  marker,
  filled,
  size: 3.4,
})

export const STYLES: Record<FigureSeries['role'], SeriesStyle> = {
  'channel-1': channel('circle', true),
  'channel-2': channel('square', false, '7 3'),
  'channel-3': channel('triangle', true, '1.5 3'),
  'channel-4': channel('diamond', false, '9 3 1.5 3'),
  coincidence: { stroke: INK, width: 1.2, marker: 'circle', filled: false, size: 2.3 },
  accidental: { stroke: ERROR_BAR, width: 1.2, marker: 'square', filled: false, size: 2.3 },
  fit: { stroke: INK, width: 2.2, marker: 'circle', filled: true, size: 2.3 },
}

export const REFERENCE_DASH = { dashed: '6 4', 'short-dashed': '3 3', dotted: '1 3' } as const

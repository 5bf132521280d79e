import { z } from 'zod'

/**
 * A figure as data: what a calculation kind draws, without saying how. The server turns it into SVG for files and print,
 * the client into an interactive plot. x and y are in the unit of the axis (delays in ns, times in s); null is a gap.
 */
const axis = z.object({
  label: z.string(),
  symbol: z.string().nullable(),
  unit: z.string(),
  scale: z.enum(['linear', 'log']),
  domain: z.tuple([z.number(), z.number()]).nullable(),
})

const numbers = z.array(z.number().nullable())

const series = z.object({
  label: z.string(),
  mark: z.enum(['points', 'line', 'band', 'stems', 'steps']),
  /** Which hue and line pattern: a detector channel 1 to 4 by position, coincidence data, accidentals, or the fit. */
  role: z.enum(['channel-1', 'channel-2', 'channel-3', 'channel-4', 'coincidence', 'accidental', 'fit']),
  x: z.array(z.number()),
  y: numbers,
  /** Ends of the error bar or band; null where there is none. */
  low: numbers.nullable(),
  high: numbers.nullable(),
})

const reference = z.object({
  axis: z.enum(['x', 'y']),
  at: z.number(),
  label: z.string(),
  style: z.enum(['dashed', 'short-dashed', 'dotted']),
})

const panel = z.object({
  y: axis,
  /** Share of the height: residual strips are about a fifth. */
  weight: z.number(),
  series: z.array(series),
  references: z.array(reference),
  /** A band that is only ground, for example the two sigma band of residuals. */
  ground: z.tuple([z.number(), z.number()]).nullable(),
})

export const figureSchema = z.object({
  title: z.string(),
  /** One sentence with the key result: the text alternative of the picture. */
  description: z.string(),
  x: axis,
  panels: z.array(panel),
  /** Columns of the data table and of result.csv. */
  table: z.object({
    columns: z.array(z.object({ name: z.string(), unit: z.string() })),
    rows: z.array(z.array(z.union([z.number(), z.string(), z.null()]))),
  }),
})

export type Figure = z.infer<typeof figureSchema>
export type FigureAxis = z.infer<typeof axis>
export type FigurePanel = z.infer<typeof panel>
export type FigureSeries = z.infer<typeof series>

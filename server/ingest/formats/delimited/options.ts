import { z } from 'zod'
import { parseDecimal, type Decimal } from '../../decimal.ts'

export const delimiterNames = ['comma', 'semicolon', 'tab', 'spaces'] as const
export type Delimiter = (typeof delimiterNames)[number]

export const timeUnits = ['ps', 'ns', 'us', 'ticks'] as const

const tickSchema = z
  .union([z.string(), z.number().transform(String)])
  .refine((text) => /^\d+(\.\d+)?$/.test(text) && (parseDecimal(text)?.digits ?? 0n) > 0n, {
    error: 'tickPs must be a positive decimal, as text: "12.5".',
  })

/**
 * How delimited text is read. With `time` and `channel` (names of columns; col1, col2, ... without a header line) it is a
 * tag record, without them a table. Delimiter and header are found when not given.
 */
export const delimitedOptions = z
  .strictObject({
    time: z.string().min(1).optional(),
    channel: z.string().min(1).optional(),
    unit: z.enum(timeUnits).optional(),
    /** Length of a tick in ps, an exact decimal. */
    tickPs: tickSchema.optional(),
    delimiter: z.enum(delimiterNames).optional(),
    header: z.boolean().optional(),
  })
  .superRefine((options, context) => {
    const refuse = (name: string, message: string) =>
      context.addIssue({ code: 'custom', path: [name], message })
    const given = [options.time, options.channel, options.unit].filter((value) => value !== undefined).length
    if (given > 0 && given < 3) refuse('time', 'time, channel and unit must be given together.')
    if (given === 3 && options.time === options.channel)
      refuse('channel', 'time and channel must be two columns.')
    if (options.unit === 'ticks' && options.tickPs === undefined) {
      refuse('tickPs', 'Times in ticks need tickPs, the length of a tick in ps.')
    }
    if (options.unit !== 'ticks' && options.tickPs !== undefined)
      refuse('tickPs', 'tickPs goes with the unit ticks only.')
  })

export type DelimitedOptions = z.output<typeof delimitedOptions>

const unitPs = { ps: '1', ns: '1000', us: '1000000' }

/** Picoseconds in one unit of the time column. */
export function unitOf(options: DelimitedOptions): Decimal {
  const text = options.unit === 'ticks' ? options.tickPs! : unitPs[options.unit ?? 'ps']
  return parseDecimal(text)!
}

import { z } from 'zod'

/** A value of picoseconds as parameters carry it: a JSON number, or digits as text above 2^53. */
export type PicosecondsValue = number | string

/** No time, delay, width or offset may exceed this, so that sums of them stay within 64 bits (definitions.md B1). */
export const MAX_PICOSECONDS = 2n ** 61n

type Described = {
  title: string
  description?: string
  unit?: string
}

export const channelParameter = (described: Described) => z.int().min(0).max(65535).meta(described)

/** Whole picoseconds, at least `min`. Text of digits is accepted and becomes a number where a number is exact. */
export function picosecondsParameter({ min, ...described }: Described & { min?: number }) {
  return z
    .union([z.int(), z.string().regex(/^-?(0|[1-9]\d*)$/, 'Give whole picoseconds.')])
    .overwrite((value) => (Number.isSafeInteger(Number(value)) ? Number(value) : value))
    .refine((value) => within(BigInt(value)), { error: 'More than 2^61 ps overflows 64-bit times.' })
    .refine((value) => min === undefined || BigInt(value) >= BigInt(min), {
      error: `Give at least ${min ?? 0} ps.`,
    })
    .meta({ unit: 'ps', ...described })
}

function within(ps: bigint): boolean {
  return ps <= MAX_PICOSECONDS && ps >= -MAX_PICOSECONDS
}

/** A known figure with its standard uncertainty; u and unit may be left out. */
export function quantityParameter(unit: string, described: Described) {
  return z
    .strictObject({
      value: z.number().meta({ title: 'Value' }),
      u: z.number().min(0).nullable().default(0).meta({ title: 'Standard uncertainty' }),
      unit: z.literal(unit).default(unit),
    })
    .meta({ unit, ...described })
}

/** Map from channel number, as text, to a value for that channel. */
export function perChannel<T extends z.ZodType>(value: T, described: Described) {
  return z
    .record(z.string().regex(/^(0|[1-9]\d{0,4})$/, 'Name a channel by its number.'), value)
    .meta(described)
}

export const uDurationParameter = z.number().min(0).optional().meta({
  title: 'Uncertainty of the acquisition time',
  unit: 'ps',
  description: 'Standard uncertainty of a declared acquisition time; it is common to the whole run.',
})

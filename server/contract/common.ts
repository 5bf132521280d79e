import { z } from 'zod'

export const idSchema = z.uuid()
export const hexDigestSchema = z.string().regex(/^[0-9a-f]{64}$/)
/** UTC with milliseconds, as signed: 2026-03-02T09:15:00.000Z. */
export const timeSchema = z.string().regex(/^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}:\d{2}\.\d{3}Z$/)
/** A time as people's programs send it: any ISO 8601 instant with zone; kept as UTC with milliseconds. */
export const timeInputSchema = z.iso.datetime({ offset: true }).transform((t) => new Date(t).toISOString())
export const base64Schema = z.base64()

/** Picoseconds: a number below 2^53, a string of digits above. */
export const picosecondsSchema = z.union([z.number().int(), z.string().regex(/^-?\d+$/)])

/** Reported decimals as typed: "4.20" stays "4.20". */
export const decimalTextSchema = z.string().regex(/^-?(0|[1-9]\d*)(\.\d+)?(e-?[1-9]\d*)?$/)

export const laboratoryRoles = ['experimentalist', 'supervisor', 'auditor', 'manager'] as const
export const roleSchema = z.enum(laboratoryRoles)
export type Role = z.infer<typeof roleSchema>

export const experiments = [
  'hbt',
  'hbt-pulsed',
  'heralded',
  'dip',
  'polarisation',
  'chaotic',
  'fringe',
  'calibration',
  'other',
] as const
export const experimentSchema = z.enum(experiments)
export type Experiment = z.infer<typeof experimentSchema>

/** A page of a list; `nextCursor` null at the end. */
export function listOf<T extends z.ZodType>(item: T) {
  return z.object({ items: z.array(item), nextCursor: z.string().nullable() })
}

export const pageQuerySchema = z.object({
  limit: z.coerce.number().int().min(1).max(200).default(50),
  cursor: z.string().optional(),
})

export const byId = z.object({ id: idSchema })

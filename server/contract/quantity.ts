import { z } from 'zod'

/** A measured value with its standard uncertainty (JCGM 100, coverage factor 1) and unit; null where none exists. */
export const quantitySchema = z.object({
  value: z.number().nullable(),
  u: z.number().nullable(),
  unit: z.string(),
  upper: z.number().optional(),
  lower: z.number().optional(),
})
export type Quantity = z.infer<typeof quantitySchema>

import { z } from 'zod'
import { picosecondsSchema } from '../../../contract/common.ts'
import { quantitySchema } from '../../../contract/quantity.ts'
import type { FigurePointer, KindDefinition } from '../../definition.ts'
import { fitModelNames } from '../../fits/models/index.ts'
import { channelParameter, picosecondsParameter, quantityParameter } from '../../parameters.ts'

const signalFraction = (title: string) =>
  z.number().gt(0).max(1).meta({ title, unit: '1', description: 'Signal over total counts.' })
const uFraction = (title: string) => z.number().min(0).default(0).meta({ title, unit: '1' })

const backgroundParameter = z
  .union([
    z.strictObject({
      rhoA: signalFraction('Signal fraction A'),
      rhoB: signalFraction('Signal fraction B'),
      uRhoA: uFraction('Its uncertainty'),
      uRhoB: uFraction('Its uncertainty'),
    }),
    z.strictObject({ rho: signalFraction('Signal fraction of both'), uRho: uFraction('Its uncertainty') }),
    z.strictObject({
      rateA: quantityParameter('cps', { title: 'Background rate A' }),
      rateB: quantityParameter('cps', { title: 'Background rate B' }),
    }),
  ])
  .meta({
    title: 'Background',
    description: 'Uncorrelated background with g2 = 1, as signal fractions or as rates.',
  })
export type BackgroundParameter = z.infer<typeof backgroundParameter>

const fitParameter = z
  .strictObject({
    model: z.enum(fitModelNames).meta({ title: 'Model' }),
    start: z.record(z.string(), z.number()).optional().meta({
      title: 'Start values',
      description: 'By parameter name; found from the data where not given.',
    }),
    responseFwhmPs: z.number().min(0).optional().meta({
      title: 'Timing response',
      unit: 'ps',
      description: 'Full width at half maximum for the pair of detectors, not for one of them.',
    }),
    tau0Ps: z
      .number()
      .optional()
      .meta({ title: 'Zero delay', unit: 'ps', description: 'Free where not given.' }),
    level: z.enum(['fixed', 'free']).default('fixed').meta({
      title: 'Level',
      description: 'Free: the model is multiplied by a parameter, for bunching beyond the fitted range.',
    }),
  })
  .meta({ title: 'Fit' })

const parametersSchema = z.strictObject({
  a: channelParameter({ title: 'Channel A', description: 'Starts; the delay is d = t_B - t_A.' }),
  b: channelParameter({ title: 'Channel B', description: 'Stops.' }),
  binPs: picosecondsParameter({ title: 'Bin', min: 1 }),
  halfRangePs: picosecondsParameter({ title: 'Half range', min: 0 }),
  offsetPs: picosecondsParameter({
    title: 'Cable offset',
    description: 'Subtracted from the delays.',
  }).default(0),
  background: backgroundParameter.optional(),
  fit: fitParameter.optional(),
})
export type CorrelationParameters = z.infer<typeof parametersSchema>

const numbers = z.array(z.number().nullable())

const fitSchema = z.object({
  model: z.enum(fitModelNames),
  converged: z.boolean(),
  reason: z.string().nullable(),
  parameters: z.record(z.string(), quantitySchema),
  g2Zero: quantitySchema.optional(),
  g2ZeroCorrected: quantitySchema.optional(),
  linewidth: quantitySchema.optional(),
  chi2: z.number().nullable(),
  dof: z.int(),
  pValue: z.number().nullable(),
  deviance: z.number().nullable(),
  responseFwhmPs: z.number(),
  level: z.enum(['fixed', 'free']),
  atBound: z.array(z.string()),
  stoppedAt: z.record(z.string(), z.number()),
  covariance: z.object({ parameters: z.array(z.string()), matrix: z.array(z.array(z.number())) }),
  values: numbers,
  valuesU: numbers,
  residuals: numbers,
})

const resultSchema = z.object({
  binPs: picosecondsSchema,
  offsetPs: picosecondsSchema,
  countsA: z.int(),
  countsB: z.int(),
  durationPs: picosecondsSchema,
  durationFrom: z.enum(['declared', 'tags']),
  /** Bin value; never from a fit, never corrected. */
  g2Zero: quantitySchema.extend({ method: z.literal('bin'), binPs: picosecondsSchema }),
  g2ZeroCorrected: quantitySchema.optional(),
  /** Scatter of g2(0) over ten equal blocks of the run, divided by sqrt 10. */
  blockU: z.number().nullable(),
  fit: fitSchema.nullable(),
  delaysPs: z.array(picosecondsSchema),
  counts: z.array(z.int()),
  g2: numbers,
  u: numbers,
  g2Low: numbers,
  g2Up: numbers,
  g2Corrected: numbers.optional(),
})
export type CorrelationResult = z.infer<typeof resultSchema>

export const correlation: KindDefinition = {
  kind: 'correlation',
  version: 1,
  title: 'Correlation',
  summary:
    'Histogram of pair delays as g2 with uncertainties, g2(0), background correction and a fitted model.',
  inputs: { min: 1, max: 100, accepts: ['tags'] },
  parameters: parametersSchema,
  result: resultSchema,
  example: { parameters: { a: 1, b: 2, binPs: 500, halfRangePs: 60000, fit: { model: 'two-level' } } },
  figures,
  load: () => import('./compute.ts'),
  loadFigure: () => import('./figure.ts'),
}

function figures(result: unknown): FigurePointer[] {
  const { fit } = result as CorrelationResult
  return [
    { pointer: '/g2Zero', label: 'g2(0), bin' },
    { pointer: '/g2ZeroCorrected', label: 'g2(0), corrected' },
    { pointer: '/fit/g2Zero', label: 'g2(0), fit' },
    { pointer: '/fit/g2ZeroCorrected', label: 'g2(0), fit, corrected' },
    ...Object.keys(fit?.parameters ?? {}).map((name) => ({
      pointer: `/fit/parameters/${name}`,
      label: name,
    })),
  ]
}

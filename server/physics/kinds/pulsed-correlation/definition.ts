import { z } from 'zod'
import { picosecondsSchema } from '../../../contract/common.ts'
import { quantitySchema } from '../../../contract/quantity.ts'
import type { KindDefinition } from '../../definition.ts'
import { channelParameter, picosecondsParameter } from '../../parameters.ts'

const parametersSchema = z.strictObject({
  a: channelParameter({ title: 'Channel A', description: 'Starts; the delay is d = t_B - t_A.' }),
  b: channelParameter({ title: 'Channel B', description: 'Stops.' }),
  periodPs: z.number().positive().optional().meta({
    title: 'Period',
    unit: 'ps',
    description: 'Of the excitation, need not be whole; found from the delays where not given.',
  }),
  peakWindowPs: picosecondsParameter({
    title: 'Peak window',
    min: 1,
    description: 'Full width, at most the period.',
  }),
  sidePeaks: z.int().min(1).max(1000).meta({ title: 'Side peaks', description: 'On each side.' }),
  offsetPs: picosecondsParameter({
    title: 'Cable offset',
    description: 'Delay of the central peak.',
  }).default(0),
  floorWindowPs: picosecondsParameter({
    title: 'Floor window',
    min: 1,
    description: 'Between the peaks; measures the floor of dark counts that is then taken out.',
  }).optional(),
})
export type PulsedParameters = z.infer<typeof parametersSchema>

const resultSchema = z.object({
  periodPs: quantitySchema,
  peakWindowPs: picosecondsSchema,
  offsetPs: picosecondsSchema,
  countsA: z.int(),
  countsB: z.int(),
  durationPs: picosecondsSchema,
  durationFrom: z.enum(['declared', 'tags']),
  peaks: z.array(z.object({ m: z.int(), delayPs: picosecondsSchema, counts: z.int() })),
  g2Zero: quantitySchema,
  g2ZeroCorrected: quantitySchema.optional(),
  sideScatter: quantitySchema.extend({
    p: z.number().nullable(),
    chi2: z.number().nullable(),
    dof: z.int(),
    mean: z.number(),
    slope: quantitySchema,
  }),
  /** Pairs in the windows between the peaks, where a floor window is given. */
  floorCounts: z.int().nullable(),
})
export type PulsedResult = z.infer<typeof resultSchema>

export const pulsedCorrelation: KindDefinition = {
  kind: 'pulsed-correlation',
  version: 1,
  title: 'Pulsed correlation',
  summary:
    'Areas of the correlation peaks under pulsed excitation: g2(0) as central over side peaks, and their scatter.',
  inputs: { min: 1, max: 100, accepts: ['tags'] },
  parameters: parametersSchema,
  result: resultSchema,
  example: { parameters: { a: 1, b: 2, periodPs: 12500, peakWindowPs: 6000, sidePeaks: 8 } },
  figures: () => [
    { pointer: '/g2Zero', label: 'g2(0)' },
    { pointer: '/g2ZeroCorrected', label: 'g2(0), corrected' },
    { pointer: '/periodPs', label: 'period' },
    { pointer: '/sideScatter', label: 'scatter of the side peaks' },
  ],
  load: () => import('./compute.ts'),
  loadFigure: () => import('./figure.ts'),
}

import { z } from 'zod'
import { picosecondsSchema } from '../../../contract/common.ts'
import { quantitySchema } from '../../../contract/quantity.ts'
import type { KindDefinition } from '../../definition.ts'
import {
  channelParameter,
  perChannel,
  picosecondsParameter,
  quantityParameter,
  uDurationParameter,
} from '../../parameters.ts'

const deadTimeParameter = z.strictObject({
  ps: z.number().min(0).meta({ title: 'Dead time', unit: 'ps' }),
  uPs: z.number().min(0).default(0).meta({ title: 'Standard uncertainty', unit: 'ps' }),
  kind: z.enum(['non-extending', 'extending']).meta({
    title: 'Kind',
    description: 'Extending: a tag inside the dead time prolongs it.',
  }),
})

const parametersSchema = z.strictObject({
  channels: z
    .array(channelParameter({ title: 'Channel' }))
    .min(1)
    .optional()
    .meta({ title: 'Channels', description: 'All channels that have tags, where not given.' }),
  traceBinPs: picosecondsParameter({
    title: 'Time bin',
    min: 1,
    description: 'Bin of the trace and of the index of dispersion; chosen from the counts where not given.',
  }).optional(),
  darkRates: perChannel(quantityParameter('cps', { title: 'Dark rate' }), {
    title: 'Dark rates',
    description: 'By channel number; subtracted after the dead-time correction.',
  }).optional(),
  deadTimes: perChannel(deadTimeParameter, {
    title: 'Dead times',
    description: 'By channel number.',
  }).optional(),
  uDurationPs: uDurationParameter,
})
export type SinglesParameters = z.infer<typeof parametersSchema>

const dispersionSchema = z.object({
  value: z.number(),
  u: z.number(),
  p: z.number(),
  bins: z.int(),
  chi2: z.number(),
  dof: z.int(),
  binPs: picosecondsSchema,
})

const resultSchema = z.object({
  durationPs: picosecondsSchema,
  durationFrom: z.enum(['declared', 'tags']),
  firstPs: picosecondsSchema,
  lastPs: picosecondsSchema,
  channels: z.array(
    z.object({
      channel: z.int(),
      counts: z.int(),
      rate: quantitySchema,
      /** Exact central 68.27 % interval of the rate, cps. */
      interval68: z.tuple([z.number(), z.number()]).nullable(),
      /** Corrected for dead time and dark counts; null where neither is given. */
      sourceRate: quantitySchema.nullable(),
      dispersion: dispersionSchema.nullable(),
      smallestGapPs: z.number().nullable(),
    }),
  ),
  trace: z.object({
    startPs: picosecondsSchema,
    binPs: picosecondsSchema,
    counts: z.record(z.string(), z.array(z.int())),
  }),
})
export type SinglesResult = z.infer<typeof resultSchema>

export const singles: KindDefinition = {
  kind: 'singles',
  version: 1,
  title: 'Singles',
  summary:
    'Counts and rate of each channel, corrected for dead time and dark counts, and whether the rate is steady.',
  inputs: { min: 1, max: 1, accepts: ['tags'] },
  parameters: parametersSchema,
  result: resultSchema,
  example: { parameters: {} },
  figures: (result) =>
    (result as SinglesResult).channels.flatMap(({ channel }, i) => [
      { pointer: `/channels/${i}/rate`, label: `R ch ${channel}` },
      { pointer: `/channels/${i}/sourceRate`, label: `source rate ch ${channel}` },
    ]),
  load: () => import('./compute.ts'),
  loadFigure: () => import('./figure.ts'),
}

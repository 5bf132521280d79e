import { z } from 'zod'
import { picosecondsSchema } from '../../../contract/common.ts'
import { quantitySchema } from '../../../contract/quantity.ts'
import type { KindDefinition } from '../../definition.ts'
import { channelParameter, picosecondsParameter } from '../../parameters.ts'

const parametersSchema = z
  .strictObject({
    herald: channelParameter({ title: 'Herald channel' }),
    a: channelParameter({ title: 'Channel of arm A' }),
    b: channelParameter({ title: 'Channel of arm B' }),
    windowAPs: picosecondsParameter({
      title: 'Window A',
      min: 1,
      description: 'Full width, on t_A - t_herald.',
    }),
    delayAPs: picosecondsParameter({ title: 'Delay A', description: 'Centre of the window.' }).default(0),
    windowBPs: picosecondsParameter({
      title: 'Window B',
      min: 1,
      description: 'Full width, on t_B - t_herald.',
    }),
    delayBPs: picosecondsParameter({ title: 'Delay B', description: 'Centre of the window.' }).default(0),
  })
  .superRefine((p, context) => {
    for (const arm of ['a', 'b'] as const) {
      if (p[arm] !== p.herald) continue
      context.addIssue({
        code: 'custom',
        path: [arm],
        message: 'An arm cannot be the herald channel: a tag would herald itself.',
      })
    }
  })
export type HeraldedParameters = z.infer<typeof parametersSchema>

const resultSchema = z.object({
  windowAPs: picosecondsSchema,
  delayAPs: picosecondsSchema,
  windowBPs: picosecondsSchema,
  delayBPs: picosecondsSchema,
  durationPs: picosecondsSchema,
  durationFrom: z.enum(['declared', 'tags']),
  heralds: z.int(),
  heraldsWithA: z.int(),
  heraldsWithB: z.int(),
  heraldsWithBoth: z.int(),
  g2: quantitySchema,
  efficiencyA: quantitySchema,
  efficiencyB: quantitySchema,
  /** Tags of either arm against their delay from a herald, around both windows. */
  delays: z.object({
    binPs: picosecondsSchema,
    delaysPs: z.array(picosecondsSchema),
    a: z.array(z.int()),
    b: z.array(z.int()),
  }),
})
export type HeraldedResult = z.infer<typeof resultSchema>

export const heralded: KindDefinition = {
  kind: 'heralded',
  version: 1,
  title: 'Heralded source',
  summary:
    'Single-photon quality of a heralded source: g2(0) of two arms given a herald, and heralding efficiencies.',
  inputs: { min: 1, max: 100, accepts: ['tags'] },
  parameters: parametersSchema,
  result: resultSchema,
  example: {
    parameters: { herald: 0, a: 1, b: 2, windowAPs: 2000, delayAPs: 5000, windowBPs: 2000, delayBPs: 5600 },
  },
  figures: () => [
    { pointer: '/g2', label: 'heralded g2(0)' },
    { pointer: '/efficiencyA', label: 'heralding efficiency A' },
    { pointer: '/efficiencyB', label: 'heralding efficiency B' },
  ],
  load: () => import('./compute.ts'),
  loadFigure: () => import('./figure.ts'),
}

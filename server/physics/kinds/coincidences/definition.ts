import { z } from 'zod'
import { picosecondsSchema } from '../../../contract/common.ts'
import { quantitySchema } from '../../../contract/quantity.ts'
import type { KindDefinition } from '../../definition.ts'
import {
  channelParameter,
  picosecondsParameter,
  quantityParameter,
  uDurationParameter,
} from '../../parameters.ts'

const noDark = { value: 0, u: 0, unit: 'cps' as const }

const parametersSchema = z
  .strictObject({
    a: channelParameter({ title: 'Channel A', description: 'The delay is d = t_B - t_A.' }),
    b: channelParameter({ title: 'Channel B' }),
    windowPs: picosecondsParameter({
      title: 'Window',
      min: 1,
      description: 'Full width. An odd width gives the same counts when A and B are swapped.',
    }),
    delayPs: picosecondsParameter({ title: 'Delay', description: 'Centre of the window.' }).default(0),
    offPeakWindows: z.int().min(0).max(10_000).default(0).meta({
      title: 'Off-peak windows',
      description: 'On each side of the peak; they measure the accidentals.',
    }),
    offPeakStepPs: picosecondsParameter({
      title: 'Off-peak step',
      min: 1,
      description:
        'Distance between windows, at least their width; a multiple of the period for pulsed light.',
    }).optional(),
    darkRates: z
      .strictObject({
        a: quantityParameter('cps', { title: 'Dark rate A' }).default(noDark),
        b: quantityParameter('cps', { title: 'Dark rate B' }).default(noDark),
      })
      .default({ a: noDark, b: noDark })
      .meta({ title: 'Dark rates', description: 'Taken off the singles in the Klyshko efficiencies.' }),
    subtract: z.enum(['offPeak', 'product']).optional().meta({
      title: 'Accidentals to subtract',
      description: 'Off-peak where off-peak windows are given, else the product of the rates.',
    }),
    responseFwhmPs: z.number().min(0).optional().meta({
      title: 'Timing response',
      unit: 'ps',
      description: 'Full width at half maximum for the pair; only to warn of a window that is too narrow.',
    }),
    uDurationPs: uDurationParameter,
  })
  .superRefine((p, context) => {
    const say = (field: string, message: string) =>
      context.addIssue({ code: 'custom', path: [field], message })
    if (p.subtract === 'offPeak' && p.offPeakWindows === 0) {
      say('subtract', 'Off-peak accidentals need at least one off-peak window.')
    }
    if (p.offPeakWindows === 0) return
    if (p.offPeakStepPs === undefined) say('offPeakStepPs', 'Off-peak windows need a step.')
    else if (BigInt(p.offPeakStepPs) < BigInt(p.windowPs)) {
      say('offPeakStepPs', 'The step must be at least the window, or off-peak windows overlap.')
    }
  })
  .overwrite((p) => ({ ...p, subtract: p.subtract ?? (p.offPeakWindows > 0 ? 'offPeak' : 'product') }))
export type CoincidencesParameters = z.infer<typeof parametersSchema>

const resultSchema = z.object({
  windowPs: picosecondsSchema,
  delayPs: picosecondsSchema,
  countsA: z.int(),
  countsB: z.int(),
  durationPs: picosecondsSchema,
  durationFrom: z.enum(['declared', 'tags']),
  counts: z.int(),
  rate: quantitySchema,
  accidentals: z.object({
    product: quantitySchema,
    offPeak: quantitySchema.nullable(),
    offPeakCounts: z.int().nullable(),
    used: z.enum(['offPeak', 'product']),
  }),
  trueRate: quantitySchema,
  car: quantitySchema,
  rawCar: quantitySchema,
  g2: quantitySchema,
  klyshko: z.object({ a: quantitySchema, b: quantitySchema }),
  /** Pairs that the product of the rates lets expect in one window. */
  expectedByProduct: z.number(),
  /** Every counted window by ascending delay, the peak among them. */
  windows: z.array(z.object({ delayPs: picosecondsSchema, counts: z.int() })),
})
export type CoincidencesResult = z.infer<typeof resultSchema>

export const coincidences: KindDefinition = {
  kind: 'coincidences',
  version: 1,
  title: 'Coincidences',
  summary:
    'Pairs of detections in a window: rate, accidentals in two independent ways, true rate, efficiencies and g2.',
  inputs: { min: 1, max: 100, accepts: ['tags'] },
  parameters: parametersSchema,
  result: resultSchema,
  example: {
    parameters: { a: 1, b: 2, windowPs: 2001, delayPs: 0, offPeakWindows: 5, offPeakStepPs: 100000 },
  },
  figures: (result) => [
    { pointer: '/rate', label: 'W2' },
    { pointer: '/trueRate', label: 'true rate' },
    { pointer: `/accidentals/${(result as CoincidencesResult).accidentals.used}`, label: 'accidentals' },
    { pointer: '/car', label: 'CAR' },
    { pointer: '/g2', label: 'g2(c)' },
    { pointer: '/klyshko/a', label: 'eta_A' },
    { pointer: '/klyshko/b', label: 'eta_B' },
  ],
  load: () => import('./compute.ts'),
  loadFigure: () => import('./figure.ts'),
}

import { z } from 'zod'
import { endpoint } from './endpoint.ts'
import {
  byId,
  decimalTextSchema,
  experimentSchema,
  idSchema,
  listOf,
  pageQuerySchema,
  picosecondsSchema,
  timeInputSchema,
  timeSchema,
} from './common.ts'
import { fileSchema } from './files.ts'

/** A condition of a run, its decimals kept as typed. */
export const conditionSchema = z.strictObject({
  name: z.string().trim().min(1).max(80),
  value: decimalTextSchema,
  u: decimalTextSchema.nullable().default(null),
  unit: z.string().max(40).nullable().default(null),
})
export type Condition = z.infer<typeof conditionSchema>

const apparatusFigureSchema = z.object({
  name: z.string(),
  value: decimalTextSchema,
  u: decimalTextSchema.nullable(),
  unit: z.string().nullable(),
  calibrationId: idSchema.nullable(),
})

/** A piece of equipment as used in a run, with the figures that were valid then. */
export const runApparatusSchema = z.object({
  id: idSchema,
  version: z.number().int(),
  kind: z.string(),
  name: z.string(),
  role: z.string().nullable(),
  channel: z.number().int().nullable(),
  figures: z.array(apparatusFigureSchema),
})
export type RunApparatus = z.infer<typeof runApparatusSchema>

/** How a request names equipment: the register supplies the rest. */
export const apparatusUseSchema = z.strictObject({
  id: idSchema,
  role: z.string().max(40).nullable().default(null),
  channel: z.number().int().min(0).max(65535).nullable().default(null),
})

export const runSchema = z.object({
  id: idSchema,
  number: z.string(),
  notebookId: idSchema,
  entryId: idSchema.nullable(),
  experiment: experimentSchema,
  startedAt: timeSchema,
  durationPs: picosecondsSchema.nullable(),
  conditions: z.array(conditionSchema),
  apparatus: z.array(runApparatusSchema),
  files: z.array(fileSchema),
  frozen: z.boolean(),
})
export type Run = z.infer<typeof runSchema>

export const newRunSchema = z.strictObject({
  experiment: experimentSchema.default('hbt'),
  startedAt: timeInputSchema.optional(),
  durationPs: picosecondsSchema.nullable().default(null),
  conditions: z.array(conditionSchema).max(100).default([]),
  apparatus: z.array(apparatusUseSchema).max(50).default([]),
})

export const apparatusSchema = z.object({
  id: idSchema,
  version: z.number().int(),
  kind: z.enum(['detector', 'source', 'filter', 'splitter']),
  name: z.string(),
  figures: z.array(apparatusFigureSchema),
})
export type Apparatus = z.infer<typeof apparatusSchema>

export const runEndpoints = {
  listRuns: endpoint({
    method: 'GET',
    path: '/notebooks/:id/runs',
    summary: 'Runs of a notebook, newest first',
    tag: 'Runs',
    params: byId,
    query: pageQuerySchema,
    reply: listOf(runSchema),
  }),
  createRun: endpoint({
    method: 'POST',
    path: '/notebooks/:id/runs',
    summary: 'A run that is not yet filed in an entry',
    tag: 'Runs',
    token: 'record',
    params: byId,
    body: newRunSchema,
    reply: runSchema,
    status: 201,
  }),
  createRunInEntry: endpoint({
    method: 'POST',
    path: '/entries/:id/runs',
    summary: 'A run filed in an entry; `{ runId }` files one that exists',
    tag: 'Runs',
    token: 'record',
    params: byId,
    body: z.union([z.strictObject({ runId: idSchema }), newRunSchema]),
    reply: runSchema,
    status: 201,
    problems: ['wrong-state'],
  }),
  getRun: endpoint({
    method: 'GET',
    path: '/runs/:id',
    summary: 'One run',
    tag: 'Runs',
    params: byId,
    reply: runSchema,
  }),
  changeRun: endpoint({
    method: 'PATCH',
    path: '/runs/:id',
    summary: 'Change conditions, duration or apparatus of a run that is not frozen',
    tag: 'Runs',
    token: 'record',
    params: byId,
    body: z.strictObject({
      experiment: experimentSchema.optional(),
      startedAt: timeInputSchema.optional(),
      durationPs: picosecondsSchema.nullable().optional(),
      conditions: z.array(conditionSchema).max(100).optional(),
      apparatus: z.array(apparatusUseSchema).max(50).optional(),
    }),
    reply: runSchema,
    problems: ['wrong-state'],
  }),
  listDetectors: endpoint({
    method: 'GET',
    path: '/apparatus/detectors',
    summary: 'Detectors with their figures valid now',
    tag: 'Apparatus',
    reply: listOf(apparatusSchema),
  }),
  listSources: endpoint({
    method: 'GET',
    path: '/apparatus/sources',
    summary: 'Sources with their figures valid now',
    tag: 'Apparatus',
    reply: listOf(apparatusSchema),
  }),
}

import { z } from 'zod'
import { endpoint } from './endpoint.ts'
import { byId, hexDigestSchema, idSchema, listOf, timeSchema } from './common.ts'
import { figureSchema } from './figure.ts'
import { problemSchema } from './problems.ts'

export const calculationStatuses = ['queued', 'running', 'done', 'failed', 'cancelled'] as const
export const calculationStatusSchema = z.enum(calculationStatuses)

/** A figure as reported: decimals as text, rounded to the uncertainty. */
export const figureTextSchema = z.object({
  pointer: z.string(),
  label: z.string(),
  value: z.string(),
  u: z.string().nullable(),
  unit: z.string().nullable(),
})
export type FigureText = z.infer<typeof figureTextSchema>

export const calculationInputSchema = z.union([
  z.strictObject({ fileId: idSchema }),
  z.strictObject({ calculationId: idSchema, pointer: z.string() }),
])

export const calculationSchema = z.object({
  id: idSchema,
  entryId: idSchema,
  label: z.string(),
  kind: z.string(),
  version: z.number().int(),
  engine: z.string(),
  status: calculationStatusSchema,
  /** An input's reading or bytes changed after the computation. */
  stale: z.boolean(),
  progress: z.object({ done: z.number(), of: z.number(), leftS: z.number().nullable() }).nullable(),
  parameters: z.record(z.string(), z.unknown()),
  inputs: z.array(
    z.union([
      z.object({ fileId: idSchema, sha256: hexDigestSchema, name: z.string() }),
      z.object({ calculationId: idSchema, pointer: z.string(), resultSha256: hexDigestSchema }),
    ]),
  ),
  result: z.record(z.string(), z.unknown()).nullable(),
  resultSha256: hexDigestSchema.nullable(),
  figures: z.array(figureTextSchema),
  provenance: z
    .object({
      engine: z.string(),
      inputs: z.array(
        z.object({ fileId: idSchema, sha256: hexDigestSchema, readingSha256: hexDigestSchema }),
      ),
      startedAt: timeSchema,
      finishedAt: timeSchema,
      worker: z.string(),
    })
    .nullable(),
  notes: z.array(z.object({ code: z.string(), detail: z.string() })),
  error: problemSchema.nullable(),
})
export type Calculation = z.infer<typeof calculationSchema>

/** An entry lists its calculations without the full result. */
export const calculationSummarySchema = calculationSchema.pick({
  id: true,
  label: true,
  kind: true,
  status: true,
  stale: true,
  figures: true,
})

export const calculationKindSchema = z.object({
  kind: z.string(),
  version: z.number().int(),
  title: z.string(),
  summary: z.string(),
  inputs: z.object({ min: z.number().int(), max: z.number().int(), accepts: z.array(z.string()) }),
  /** JSON Schema of the parameters, with titles and units. */
  parameters: z.record(z.string(), z.unknown()),
  example: z.record(z.string(), z.unknown()),
})
export type CalculationKind = z.infer<typeof calculationKindSchema>

export const calculationEndpoints = {
  listCalculationKinds: endpoint({
    method: 'GET',
    path: '/calculation-kinds',
    summary: 'Every kind with its inputs and parameters',
    tag: 'Calculations',
    reply: listOf(calculationKindSchema),
  }),
  startCalculation: endpoint({
    method: 'POST',
    path: '/entries/:id/calculations',
    summary: 'Compute; 201 when the answer is already known, 202 when queued',
    tag: 'Calculations',
    token: 'record',
    params: byId,
    body: z.strictObject({
      kind: z.string(),
      inputs: z.array(calculationInputSchema).max(200),
      parameters: z.record(z.string(), z.unknown()).default({}),
    }),
    reply: calculationSchema,
    status: 202,
    problems: ['unreadable-file', 'wrong-state'],
  }),
  getCalculation: endpoint({
    method: 'GET',
    path: '/calculations/:id',
    summary: 'State and result of a calculation',
    tag: 'Calculations',
    params: byId,
    reply: calculationSchema,
  }),
  cancelCalculation: endpoint({
    method: 'DELETE',
    path: '/calculations/:id',
    summary: 'Stop a calculation that waits or runs',
    tag: 'Calculations',
    token: 'record',
    params: byId,
    reply: calculationSchema,
    problems: ['wrong-state'],
  }),
  recompute: endpoint({
    method: 'POST',
    path: '/calculations/:id/successors',
    summary:
      'Compute again with other parameters. A calculation never changes: the answer is a new one (new id, same label) ' +
      'whose id takes the place of the old in the block and in the quoted results of the text',
    tag: 'Calculations',
    token: 'record',
    params: byId,
    body: z.strictObject({ parameters: z.record(z.string(), z.unknown()) }),
    reply: calculationSchema,
    status: 202,
    problems: ['wrong-state'],
  }),
  watchCalculation: endpoint({
    method: 'GET',
    path: '/calculations/:id/events',
    summary: 'Server-sent events: progress and outcome',
    tag: 'Calculations',
    params: byId,
    reply: 'events',
  }),
  getCalculationFigure: endpoint({
    method: 'GET',
    path: '/calculations/:id/figure',
    summary: 'The figure as data',
    tag: 'Calculations',
    params: byId,
    reply: figureSchema,
    problems: ['wrong-state'],
  }),
  getCalculationCsv: endpoint({
    method: 'GET',
    path: '/calculations/:id/result.csv',
    summary: 'The numbers of the figure',
    tag: 'Calculations',
    params: byId,
    reply: 'bytes',
    problems: ['wrong-state'],
  }),
  getCalculationSvg: endpoint({
    method: 'GET',
    path: '/calculations/:id/figure.svg',
    summary: 'The figure as published',
    tag: 'Calculations',
    params: byId,
    reply: 'bytes',
    problems: ['wrong-state'],
  }),
}

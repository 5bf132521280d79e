import { z } from 'zod'
import { endpoint } from './endpoint.ts'
import { byId, hexDigestSchema, idSchema, listOf, timeSchema } from './common.ts'
import { problemSchema } from './problems.ts'

export const exportSchema = z.object({
  id: idSchema,
  status: z.enum(['queued', 'running', 'waiting-for-time-stamp', 'done', 'failed']),
  entries: z.array(z.object({ id: idSchema, number: z.string() })),
  notebookId: idSchema.nullable(),
  name: z.string().nullable(),
  size: z.number().int().nullable(),
  sha256: hexDigestSchema.nullable(),
  error: problemSchema.nullable(),
  createdAt: timeSchema,
  expiresAt: timeSchema,
})
export type BundleExport = z.infer<typeof exportSchema>

export const exportEndpoints = {
  listExports: endpoint({
    method: 'GET',
    path: '/exports',
    summary: 'My exports, newest first',
    tag: 'Exports',
    token: 'never',
    reply: listOf(exportSchema),
  }),
  startExport: endpoint({
    method: 'POST',
    path: '/exports',
    summary: 'A bundle of sealed entries, or of a notebook',
    tag: 'Exports',
    body: z.union([
      z.strictObject({ notebookId: idSchema, withoutRaw: z.boolean().default(false) }),
      z.strictObject({
        entryIds: z.array(idSchema).min(1).max(1000),
        withoutRaw: z.boolean().default(false),
      }),
    ]),
    reply: exportSchema,
    status: 202,
    problems: ['wrong-state'],
  }),
  getExport: endpoint({
    method: 'GET',
    path: '/exports/:id',
    summary: 'State of an export',
    tag: 'Exports',
    token: 'never',
    params: byId,
    reply: exportSchema,
  }),
  getBundle: endpoint({
    method: 'GET',
    path: '/exports/:id/bundle',
    summary: 'The bundle (zip)',
    tag: 'Exports',
    token: 'never',
    params: byId,
    reply: 'bytes',
    problems: ['wrong-state'],
  }),
}

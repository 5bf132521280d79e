import { z } from 'zod'
import { endpoint } from './endpoint.ts'
import {
  byId,
  experimentSchema,
  hexDigestSchema,
  idSchema,
  listOf,
  pageQuerySchema,
  timeInputSchema,
  timeSchema,
} from './common.ts'
import { calculationSummarySchema } from './calculations.ts'
import { fileSchema } from './files.ts'
import { runSchema } from './runs.ts'
import { entrySignatureSchema } from './signatures.ts'

export const entryStates = ['draft', 'submitted', 'sealed', 'withdrawn'] as const
export const entryPhases = [
  'writing',
  'collecting',
  'returned',
  'with-witness',
  'sealed',
  'withdrawn',
] as const
export const entryActions = [
  'edit',
  'sign:authorship',
  'witness:read',
  'witness:present',
  'return',
  'reopen',
  'withdraw',
  'addendum',
  'export',
] as const

const amendsSchema = z.object({ entryId: idSchema, number: z.string(), bodySha256: hexDigestSchema })

export const entrySummarySchema = z.object({
  id: idSchema,
  notebookId: idSchema,
  number: z.string(),
  title: z.string(),
  experiment: experimentSchema,
  state: z.enum(entryStates),
  phase: z.enum(entryPhases),
  important: z.boolean(),
  authors: z.array(z.object({ personId: idSchema, name: z.string(), signed: z.boolean() })),
  createdAt: timeSchema,
  updatedAt: timeSchema,
  /** When it came to the witness; null unless it waits there. */
  submittedAt: timeSchema.nullable(),
})
export type EntrySummary = z.infer<typeof entrySummarySchema>

export const blockSchema = z.object({ code: z.string(), detail: z.string(), pointer: z.string().nullable() })

export const entrySchema = entrySummarySchema.extend({
  runAt: timeSchema,
  workDate: z.string(),
  lateRemark: z.string().nullable(),
  revision: z.number().int(),
  contentSha256: hexDigestSchema,
  bodySha256: hexDigestSchema.nullable(),
  runs: z.array(runSchema),
  files: z.array(fileSchema),
  calculations: z.array(calculationSummarySchema),
  signatures: z.array(entrySignatureSchema),
  witnesses: z.object({ required: z.number().int(), given: z.number().int() }),
  returned: z.object({ reason: z.string(), by: z.string(), at: timeSchema }).nullable(),
  amends: amendsSchema.nullable(),
  amendedBy: z.array(z.object({ entryId: idSchema, number: z.string() })),
  seal: z.object({ sequence: z.number().int(), digest: hexDigestSchema, time: timeSchema }).nullable(),
  /** What stands in the way of signing, each with a sentence. */
  blocks: z.array(blockSchema),
  allowed: z.array(z.enum(entryActions)),
})
export type Entry = z.infer<typeof entrySchema>

/** A ProseMirror document; the server checks it against the editor's schema. */
export const contentSchema = z.looseObject({
  type: z.literal('doc'),
  content: z.array(z.unknown()).optional(),
})

export const revisionSchema = z.object({
  revision: z.number().int(),
  authorId: idSchema,
  author: z.string(),
  time: timeSchema,
  cause: z.string(),
  contentSha256: hexDigestSchema,
})

const title = z.string().trim().min(1, 'Give the entry a title.').max(300)

export const entryEndpoints = {
  listEntries: endpoint({
    method: 'GET',
    path: '/notebooks/:id/entries',
    summary: 'Entries of a notebook, newest first',
    tag: 'Entries',
    params: byId,
    query: pageQuerySchema,
    reply: listOf(entrySummarySchema),
  }),
  listMyEntries: endpoint({
    method: 'GET',
    path: '/entries',
    summary: 'Entries the caller may read, newest change first; `waiting` gives those the caller can witness',
    tag: 'Entries',
    query: pageQuerySchema.extend({
      waiting: z.stringbool().default(false),
      mine: z.stringbool().default(false),
    }),
    reply: listOf(entrySummarySchema.extend({ notebookTitle: z.string() })),
  }),
  createEntry: endpoint({
    method: 'POST',
    path: '/notebooks/:id/entries',
    summary: 'A new entry with the next number of the notebook',
    tag: 'Entries',
    token: 'record',
    params: byId,
    body: z.strictObject({
      title,
      experiment: experimentSchema.default('hbt'),
      runAt: timeInputSchema.optional(),
    }),
    reply: entrySchema,
    status: 201,
  }),
  getEntry: endpoint({
    method: 'GET',
    path: '/entries/:id',
    summary: 'One entry',
    tag: 'Entries',
    params: byId,
    reply: entrySchema,
  }),
  changeEntry: endpoint({
    method: 'PATCH',
    path: '/entries/:id',
    summary: 'Title, experiment, time of the run, remark on late writing, important flag',
    tag: 'Entries',
    token: 'record',
    params: byId,
    body: z.strictObject({
      title: title.optional(),
      experiment: experimentSchema.optional(),
      runAt: timeInputSchema.optional(),
      lateRemark: z.string().trim().min(1).max(2000).nullable().optional(),
      important: z.boolean().optional(),
    }),
    reply: entrySchema,
    problems: ['wrong-state'],
  }),
  getContent: endpoint({
    method: 'GET',
    path: '/entries/:id/content',
    summary: 'The rich text, with an ETag',
    tag: 'Entries',
    params: byId,
    reply: contentSchema,
  }),
  putContent: endpoint({
    method: 'PUT',
    path: '/entries/:id/content',
    summary: 'Save the rich text; If-Match is needed',
    tag: 'Entries',
    token: 'record',
    params: byId,
    body: contentSchema,
    reply: z.object({ revision: z.number().int(), save: z.number().int(), savedAt: timeSchema }),
    problems: ['stale-content', 'missing-precondition', 'wrong-state', 'too-large'],
  }),
  cutRevision: endpoint({
    method: 'POST',
    path: '/entries/:id/revisions',
    summary: 'Make a revision of what was saved last (on leaving the sheet)',
    tag: 'Entries',
    token: 'record',
    params: byId,
    body: z.strictObject({ cause: z.enum(['leaving', 'pause']) }),
    reply: z.object({ revision: z.number().int() }),
    problems: ['wrong-state'],
  }),
  listRevisions: endpoint({
    method: 'GET',
    path: '/entries/:id/revisions',
    summary: 'History of an entry',
    tag: 'Entries',
    params: byId,
    reply: listOf(revisionSchema),
  }),
  getRevision: endpoint({
    method: 'GET',
    path: '/entries/:id/revisions/:n',
    summary: 'One revision with its content',
    tag: 'Entries',
    params: z.object({ id: idSchema, n: z.coerce.number().int().min(1) }),
    reply: revisionSchema.extend({ content: contentSchema }),
  }),
}

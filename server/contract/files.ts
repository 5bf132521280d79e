import { z } from 'zod'
import { endpoint } from './endpoint.ts'
import { byId, hexDigestSchema, idSchema, picosecondsSchema, timeSchema } from './common.ts'

export const fileStates = ['receiving', 'stored', 'verified', 'mismatch', 'missing'] as const

/** How a file is read, and what was found in it. */
export const readingSchema = z.object({
  status: z.enum(['pending', 'ready', 'unreadable']),
  format: z.string().nullable(),
  version: z.number().int().nullable(),
  options: z.record(z.string(), z.unknown()).nullable(),
  kind: z.enum(['tags', 'table', 'histogram', 'other']).nullable(),
  tags: z.number().int().nullable(),
  durationPs: picosecondsSchema.nullable(),
  firstPs: picosecondsSchema.nullable(),
  lastPs: picosecondsSchema.nullable(),
  resolutionPs: picosecondsSchema.nullable(),
  outOfOrder: z.number().int().nullable(),
  channels: z.array(z.object({ channel: z.number().int(), counts: z.number().int() })).nullable(),
  /** Why it cannot be read and what is usable, or what is doubtful about the reading found. */
  detail: z.string().nullable(),
})
export type Reading = z.infer<typeof readingSchema>

export const fileSchema = z.object({
  id: idSchema,
  entryId: idSchema.nullable(),
  runId: idSchema.nullable(),
  name: z.string(),
  size: z.number().int(),
  sha256: hexDigestSchema,
  state: z.enum(fileStates),
  uploadedBy: idSchema,
  uploadedByName: z.string(),
  uploadedAt: timeSchema,
  /** The same bytes are here under another name or entry that the caller may read. */
  sameBytesAs: z.array(z.object({ fileId: idSchema, name: z.string() })),
  reading: readingSchema,
})
export type RawFile = z.infer<typeof fileSchema>

export const fileEndpoints = {
  uploadToRun: endpoint({
    method: 'POST',
    path: '/runs/:id/files',
    summary: 'Upload a raw file to a run (multipart, field `file`)',
    tag: 'Files',
    token: 'record',
    params: byId,
    body: 'multipart',
    reply: fileSchema,
    status: 201,
    problems: ['too-large', 'upload-refused', 'wrong-state'],
  }),
  uploadToEntry: endpoint({
    method: 'POST',
    path: '/entries/:id/files',
    summary: 'Upload a raw file to an entry (multipart, field `file`)',
    tag: 'Files',
    token: 'record',
    params: byId,
    body: 'multipart',
    reply: fileSchema,
    status: 201,
    problems: ['too-large', 'upload-refused', 'wrong-state'],
  }),
  getFile: endpoint({
    method: 'GET',
    path: '/files/:id',
    summary: 'Description of a file',
    tag: 'Files',
    params: byId,
    reply: fileSchema,
  }),
  getFileContent: endpoint({
    method: 'GET',
    path: '/files/:id/content',
    summary: 'The bytes as uploaded (Range allowed)',
    tag: 'Files',
    params: byId,
    reply: 'bytes',
    problems: ['range-not-satisfiable'],
  }),
  setReading: endpoint({
    method: 'PUT',
    path: '/files/:id/reading',
    summary: 'How to read a file when the reading found by itself is not the right one',
    tag: 'Files',
    token: 'record',
    params: byId,
    body: z.strictObject({ format: z.string(), options: z.record(z.string(), z.unknown()) }),
    reply: readingSchema,
    problems: ['unreadable-file', 'wrong-state'],
  }),
}

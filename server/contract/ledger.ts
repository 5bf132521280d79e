import { z } from 'zod'
import { endpoint } from './endpoint.ts'
import { base64Schema, hexDigestSchema, idSchema, listOf, timeSchema } from './common.ts'

const hash = hexDigestSchema

export const ledgerEventSchema = z.object({
  schema: z.literal('halfsilver-event/1'),
  epoch: z.number().int(),
  sequence: z.number().int(),
  time: timeSchema,
  actor: z.object({
    kind: z.enum(['person', 'token', 'worker', 'system']),
    id: idSchema.nullable(),
    onBehalfOf: idSchema.nullable(),
  }),
  action: z.string(),
  subject: z.object({ kind: z.string(), id: idSchema }),
  subjectSequence: z.number().int(),
  subjectPrevious: hash.nullable(),
  payload: z.record(z.string(), z.unknown()),
  previous: hash,
  digest: hash,
  leafHash: hash,
})
export type LedgerEventView = z.infer<typeof ledgerEventSchema>

const headSchema = z.object({
  schema: z.literal('halfsilver-head/1'),
  laboratory: idSchema,
  epoch: z.number().int(),
  treeSize: z.number().int(),
  rootHash: hash,
  lastDigest: hash,
  time: timeSchema,
  previous: z.object({ treeSize: z.number().int(), rootHash: hash }).nullable(),
  keySha256: hash,
})

export const signedHeadSchema = z.object({
  head: headSchema,
  signature: base64Schema,
  timeStamp: base64Schema.nullable(),
})

export const anchorsSchema = z.object({
  schema: z.literal('halfsilver-anchors/1'),
  laboratory: idSchema,
  caSha256: hash,
  ledgerKeysSha256: z.array(hash),
  rootEnrolmentSha256: hash,
  tsaRootsSha256: z.array(hash),
})

export const verificationSchema = z.object({
  holds: z.boolean(),
  events: z.number().int(),
  /** First event that does not hold, with the reason; null when the chain holds. */
  firstBroken: z.object({ sequence: z.number().int(), detail: z.string() }).nullable(),
  rootHash: hash.nullable(),
  head: z.enum(['matches', 'differs', 'not-comparable', 'not-given', 'none']),
  checkedAt: timeSchema,
  durationS: z.number(),
  detail: z.string(),
})

export const ledgerEndpoints = {
  listEvents: endpoint({
    method: 'GET',
    path: '/ledger',
    summary: 'Events, newest first (auditors and managers all; others those of entries they may read)',
    tag: 'Ledger',
    query: z.object({
      limit: z.coerce.number().int().min(1).max(500).default(100),
      cursor: z.string().optional(),
      action: z.string().optional(),
      subject: idSchema.optional(),
    }),
    reply: listOf(
      ledgerEventSchema.extend({ actorName: z.string().nullable(), subjectName: z.string().nullable() }),
    ),
  }),
  getHead: endpoint({
    method: 'GET',
    path: '/ledger/head',
    summary: 'The newest signed head, or the one of a tree size',
    tag: 'Ledger',
    query: z.object({ treeSize: z.coerce.number().int().min(1).optional() }),
    reply: signedHeadSchema,
  }),
  getAnchors: endpoint({
    method: 'GET',
    path: '/ledger/anchors',
    summary: 'Digests of the laboratory’s root keys, to be kept elsewhere',
    tag: 'Ledger',
    reply: anchorsSchema,
  }),
  getConsistency: endpoint({
    method: 'GET',
    path: '/ledger/consistency',
    summary: 'Proof that a later tree continues an earlier one',
    tag: 'Ledger',
    query: z.object({ from: z.coerce.number().int().min(1), to: z.coerce.number().int().min(1) }),
    reply: z.object({ from: z.number().int(), to: z.number().int(), path: z.array(hash) }),
  }),
  getInclusionProof: endpoint({
    method: 'GET',
    path: '/ledger/:seq/proof',
    summary: 'Inclusion proof of one event',
    tag: 'Ledger',
    params: z.object({ seq: z.coerce.number().int().min(1) }),
    query: z.object({ treeSize: z.coerce.number().int().min(1).optional() }),
    reply: z.object({
      sequence: z.number().int(),
      leafHash: hash,
      treeSize: z.number().int(),
      rootHash: hash,
      path: z.array(hash),
    }),
  }),
  verifyLedger: endpoint({
    method: 'POST',
    path: '/ledger/verifications',
    summary: 'Recompute the whole chain; a head from a mail may be given',
    tag: 'Ledger',
    body: z.strictObject({ head: signedHeadSchema.optional() }).default({}),
    reply: verificationSchema,
  }),
}

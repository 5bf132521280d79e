import { z } from 'zod'
import { endpoint } from './endpoint.ts'
import {
  base64Schema,
  byId,
  hexDigestSchema,
  idSchema,
  roleSchema,
  timeInputSchema,
  timeSchema,
} from './common.ts'
import { keyStatusSchema } from './people.ts'

export const meanings = ['authorship', 'witness-read', 'witness-present'] as const
export const meaningSchema = z.enum(meanings)
export type Meaning = z.infer<typeof meaningSchema>

export const timeStampSchema = z.object({
  status: z.enum(['pending', 'stamped']),
  time: timeSchema.nullable(),
  authority: z.string().nullable(),
  /** False while the laboratory stamps by its own authority, which proves nothing to outsiders. */
  independent: z.boolean(),
})

export const entrySignatureSchema = z.object({
  id: idSchema,
  meaning: meaningSchema,
  statement: z.string(),
  signer: z.object({ personId: idSchema, name: z.string(), role: roleSchema }),
  time: timeSchema,
  recordSha256: hexDigestSchema,
  timeStamp: timeStampSchema,
  voided: z.boolean(),
})
export type EntrySignature = z.infer<typeof entrySignatureSchema>

export const kdfSchema = z.strictObject({
  name: z.literal('scrypt'),
  n: z.number().int().min(131072),
  r: z.number().int().min(8),
  p: z.number().int().min(1),
  salt: base64Schema,
})
export type Kdf = z.infer<typeof kdfSchema>

export const signingKeySchema = z.object({
  status: keyStatusSchema,
  publicKey: z.string().nullable(),
  certificate: z.string().nullable(),
  kdf: kdfSchema.nullable(),
  enrolmentSha256: hexDigestSchema.nullable(),
  lockedUntil: timeSchema.nullable(),
  expiresAt: timeSchema.nullable(),
})
export type SigningKey = z.infer<typeof signingKeySchema>

const documentSchema = z.object({ id: idSchema, document: base64Schema })
const reason = z.string().trim().min(1, 'Give a reason.').max(2000)

export const signatureEndpoints = {
  getSigningKey: endpoint({
    method: 'GET',
    path: '/me/signing-key',
    summary: 'My signing key',
    tag: 'Keys',
    token: 'never',
    reply: signingKeySchema,
  }),
  prepareEnrolment: endpoint({
    method: 'POST',
    path: '/me/signing-key/enrolments',
    summary: 'The statement that a new key signs (valid for 15 min)',
    tag: 'Keys',
    body: z.strictObject({ publicKey: base64Schema }),
    reply: documentSchema,
    status: 201,
  }),
  putSigningKey: endpoint({
    method: 'PUT',
    path: '/me/signing-key',
    summary: 'Enrol a key: signed statement, derivation parameters, wrapped key, digest of the proof',
    tag: 'Keys',
    body: z.strictObject({
      enrolmentId: idSchema,
      signature: base64Schema,
      kdf: kdfSchema,
      wrappedKey: base64Schema,
      iv: base64Schema,
      proofSha256: hexDigestSchema,
    }),
    reply: signingKeySchema,
  }),
  unlockSigningKey: endpoint({
    method: 'POST',
    path: '/me/signing-key/unlock',
    summary: 'The wrapped key against the proof',
    tag: 'Keys',
    body: z.strictObject({ proof: base64Schema }),
    reply: z.object({ wrappedKey: base64Schema, iv: base64Schema }),
    problems: ['wrong-passphrase', 'signing-locked', 'key-not-active'],
  }),
  getEnrolment: endpoint({
    method: 'GET',
    path: '/people/:id/enrolment',
    summary: 'A person’s enrolment, to be checked and endorsed',
    tag: 'Keys',
    token: 'never',
    params: byId,
    reply: z.object({
      document: base64Schema,
      signature: base64Schema,
      enrolmentSha256: hexDigestSchema,
      status: keyStatusSchema,
    }),
  }),
  prepareEndorsement: endpoint({
    method: 'POST',
    path: '/people/:id/endorsements',
    summary: 'The endorsement to be signed by a manager or supervisor who is not that person',
    tag: 'Keys',
    params: byId,
    body: z.strictObject({ enrolmentSha256: hexDigestSchema, identity: z.string().trim().min(1).max(500) }),
    reply: documentSchema,
    status: 201,
  }),
  putEndorsement: endpoint({
    method: 'PUT',
    path: '/people/:id/endorsements/:endorsementId',
    summary: 'Sign the endorsement; the key becomes active',
    tag: 'Keys',
    params: z.object({ id: idSchema, endorsementId: idSchema }),
    body: z.strictObject({ signature: base64Schema }),
    reply: z.object({ status: keyStatusSchema }),
  }),
  getSigningRecord: endpoint({
    method: 'GET',
    path: '/entries/:id/signing-record',
    summary: 'The exact bytes to sign (canonical JSON, valid for 15 min)',
    tag: 'Signatures',
    token: 'never',
    params: byId,
    query: z.object({
      meaning: meaningSchema,
      runId: idSchema.optional(),
      from: timeInputSchema.optional(),
      to: timeInputSchema.optional(),
    }),
    reply: 'bytes',
    problems: ['signing-blocked', 'wrong-state', 'key-not-active', 'invalid-values'],
  }),
  signEntry: endpoint({
    method: 'POST',
    path: '/entries/:id/signatures',
    summary: 'Give the signature over the prepared bytes; moves the state',
    tag: 'Signatures',
    params: byId,
    body: z.strictObject({ meaning: meaningSchema, recordSha256: hexDigestSchema, signature: base64Schema }),
    reply: entrySignatureSchema,
    status: 201,
    problems: ['record-changed', 'record-expired', 'signing-blocked', 'wrong-state', 'key-not-active'],
  }),
  returnEntry: endpoint({
    method: 'POST',
    path: '/entries/:id/returns',
    summary: 'Back to the author with a reason; voids the signatures given',
    tag: 'Signatures',
    params: byId,
    body: z.strictObject({ reason }),
    reply: z.object({ state: z.string(), phase: z.string() }),
    problems: ['wrong-state'],
  }),
  withdrawEntry: endpoint({
    method: 'POST',
    path: '/entries/:id/withdrawals',
    summary: 'Put a draft aside; it stays readable for ever',
    tag: 'Signatures',
    params: byId,
    body: z.strictObject({ reason }),
    reply: z.object({ state: z.string(), phase: z.string() }),
    problems: ['wrong-state'],
  }),
  createAddendum: endpoint({
    method: 'POST',
    path: '/entries/:id/addenda',
    summary: 'A new entry that amends a sealed one',
    tag: 'Signatures',
    token: 'never',
    params: byId,
    body: z.strictObject({ title: z.string().trim().min(1).max(300).optional() }),
    reply: z.object({ id: idSchema, number: z.string() }),
    status: 201,
    problems: ['wrong-state'],
  }),
}

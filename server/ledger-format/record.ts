import { z } from 'zod'
import { canonicalBytes, parseCanonical } from './canonical-json.ts'
import { contentSha256 } from './content.ts'
import { sha256Hex } from './digest.ts'
import { meaningForm } from './event-payloads.ts'
import { checkForm, countForm, hexForm, idForm, textForm, timeForm } from './forms.ts'
import { bodyForm, type RecordBody } from './record-body.ts'
import { byKeys, inRecordOrder } from './record-order.ts'
import { roleSchema } from '../contract/common.ts'

const earlierForm = z.strictObject({
  recordSha256: hexForm,
  signatureSha256: hexForm,
  meaning: meaningForm,
  subjectId: idForm,
  time: timeForm,
})

const signingForm = z.strictObject({
  id: idForm,
  meaning: meaningForm,
  statement: textForm,
  signer: z.strictObject({
    subjectId: idForm,
    name: textForm,
    role: roleSchema,
    certificateSha256: hexForm,
    enrolmentSha256: hexForm,
  }),
  time: timeForm,
  zone: textForm,
  /** Only for witness-present. */
  presentFor: z.strictObject({ runId: idForm, from: timeForm, to: timeForm }).nullable(),
  /** What the witness opened, from the server's own log; null for authorship. */
  opened: z
    .array(z.strictObject({ kind: z.enum(['text', 'calculation', 'file']), id: idForm, time: timeForm }))
    .nullable(),
  release: textForm,
  policyVersion: textForm,
  /** The newest event at preparation: the signature was not made before it. */
  ledger: z.strictObject({ sequence: countForm, leafHash: hexForm }),
  /** Every living signature at preparation. */
  earlier: z.array(earlierForm),
})
export type Signing = z.infer<typeof signingForm>

/** record.json: what one person signs (shapes 1). */
export const recordForm = z.strictObject({ ...bodyForm.shape, bodySha256: hexForm, signing: signingForm })
export type SignedRecord = z.infer<typeof recordForm>

export interface BuiltBody {
  body: RecordBody
  /** JCS of the body; kept, since every later signer gets these same bytes. */
  bytes: Uint8Array
  /** SHA-256 of `bytes`, hex. */
  bodySha256: string
}

/** Puts the parts into their order, adds the digest of the content, checks the form. @throws Error naming the member. */
export function buildBody(parts: Omit<RecordBody, 'schema' | 'contentSha256'>): BuiltBody {
  const body: RecordBody = {
    schema: 'halfsilver-record/1',
    ...inRecordOrder(parts),
    contentSha256: contentSha256(parts.content),
  }
  checkForm(bodyForm, body)
  return describeBody(canonicalBytes(body))
}

/** The body of bytes that were kept. @throws when they are not canonical or no body. */
export function describeBody(bytes: Uint8Array): BuiltBody {
  const body = parseCanonical(bytes)
  checkForm(bodyForm, body)
  return { body, bytes, bodySha256: sha256Hex(bytes) }
}

export interface BuiltRecord {
  record: SignedRecord
  /** The signed bytes: record.json. */
  bytes: Uint8Array
  recordSha256: string
}

/** One signature's record: the body as kept, and who signs it, when, as what. */
export function buildRecord(body: BuiltBody, signing: Signing): BuiltRecord {
  const ordered: Signing = {
    ...signing,
    opened:
      signing.opened &&
      [...signing.opened].sort(
        byKeys(
          (item) => item.time,
          (item) => item.id,
        ),
      ),
    earlier: [...signing.earlier].sort(
      byKeys(
        (item) => item.time,
        (item) => item.recordSha256,
      ),
    ),
  }
  const record: SignedRecord = { ...body.body, bodySha256: body.bodySha256, signing: ordered }
  checkForm(recordForm, record)
  const problem = signingProblem(record)
  if (problem !== null) throw new Error(problem)
  const bytes = recordBytes(record)
  return { record, bytes, recordSha256: sha256Hex(bytes) }
}

export function recordBytes(record: SignedRecord): Uint8Array {
  return canonicalBytes(record)
}

/** The body of a record: every member but `bodySha256` and `signing`. */
export function bodyOf(record: SignedRecord): RecordBody {
  return Object.fromEntries(
    Object.entries(record).filter(([name]) => name !== 'bodySha256' && name !== 'signing'),
  ) as RecordBody
}

/** What is wrong within the signing part of a record, or null: opened and presentFor go with the meaning, presence with the run. */
export function signingProblem(record: SignedRecord): string | null {
  const { meaning, opened, presentFor } = record.signing
  if ((opened === null) !== (meaning === 'authorship')) return '`opened` does not go with the meaning'
  if ((presentFor === null) !== (meaning !== 'witness-present'))
    return '`presentFor` does not go with the meaning'
  if (presentFor === null) return null
  const run = record.runs.find((candidate) => candidate.id === presentFor.runId)
  if (!run || presentFor.from > presentFor.to) return 'present for no run of this entry'
  return overlaps(presentFor, run) ? null : 'presence does not overlap the run'
}

/** True when a presence overlaps a run, ends included; durationPs in picoseconds, as text. */
export function overlaps(
  presence: { from: string; to: string },
  run: { startedAt: string; durationPs: string | null },
): boolean {
  const begin = Date.parse(run.startedAt)
  const end = begin + Number(run.durationPs ?? '0') / 1e9
  return Date.parse(presence.from) <= end && begin <= Date.parse(presence.to)
}

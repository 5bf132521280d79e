import { z } from 'zod'
import {
  base64Form,
  countForm,
  entryNumberForm,
  freeForm,
  hexForm,
  idForm,
  integerTextForm,
  textForm,
  timeForm,
} from './forms.ts'

export const meanings = ['authorship', 'witness-read', 'witness-present'] as const
export const meaningForm = z.enum(meanings)
export type Meaning = z.infer<typeof meaningForm>

const enrolled = z.strictObject({
  subjectId: idForm,
  enrolmentSha256: hexForm,
  supersedes: hexForm.nullable(),
})
const voiding = z.strictObject({ reason: textForm.nullable(), voided: z.array(hexForm) })

/** Payload of each action that has a fixed one: exactly these members (shapes 3). Other actions take any. */
export const eventPayloads = {
  'laboratory.opened': z.strictObject({
    laboratory: idForm,
    demo: z.boolean(),
    caSha256: hexForm,
    ledgerKeySha256: hexForm,
    tsaRootSha256: hexForm,
  }),
  'key.root-enrolled': enrolled,
  'key.enrolled': enrolled,
  'key.endorsed': z.strictObject({ enrolmentSha256: hexForm, endorsementSha256: hexForm }),
  'key.certified': z.strictObject({
    enrolmentSha256: hexForm,
    certificateSha256: hexForm,
    notAfter: timeForm,
  }),
  'key.revoked': z.strictObject({ enrolmentSha256: hexForm, reason: textForm }),
  'entry.created': z.strictObject({ notebookId: idForm, number: entryNumberForm }),
  'entry.revised': z.strictObject({ revision: countForm, contentSha256: hexForm, cause: textForm }),
  'entry.run-filed': z.strictObject({ runId: idForm, runSubjectSequence: countForm, runDigest: hexForm }),
  'file.stored': z.strictObject({ fileId: idForm, sha256: hexForm, size: integerTextForm }),
  'reading.set': z.strictObject({ fileId: idForm, readingSha256: hexForm }),
  'calculation.finished': z.strictObject({
    calculationId: idForm,
    kind: textForm,
    version: countForm,
    engine: textForm,
    resultSha256: hexForm,
  }),
  'entry.signed': z.strictObject({
    recordSha256: hexForm,
    signatureSha256: hexForm,
    meaning: meaningForm,
    bodySha256: hexForm,
  }),
  'entry.sealed': z.strictObject({ bodySha256: hexForm, signatures: z.array(hexForm) }),
  'entry.reopened': voiding,
  'entry.returned': voiding,
  'entry.withdrawn': voiding,
  'entry.author-excepted': z.strictObject({ subjectId: idForm, reason: textForm }),
  'entry.rendered': z.strictObject({
    files: z.array(z.strictObject({ name: textForm, sha256: hexForm })),
    chains: z.array(
      z.strictObject({
        kind: z.enum(['key', 'entry']),
        id: idForm,
        subjectSequence: countForm,
        digest: hexForm,
      }),
    ),
  }),
  'entry.amended': z.strictObject({ byEntryId: idForm, bodySha256: hexForm }),
  'ledger.key-rotated': z.strictObject({ from: hexForm, to: hexForm, statementSha256: hexForm }),
  'ledger.tsa-added': z.strictObject({ tsaRootSha256: hexForm }),
  'ledger.restored': z.strictObject({
    restoredTreeSize: countForm,
    restoredRootHash: hexForm,
    knownTreeSize: countForm,
    knownRootHash: hexForm,
    reason: textForm,
    enrolmentSha256: hexForm,
    signature: base64Form(64),
  }),
} as const

export type KnownAction = keyof typeof eventPayloads
export type PayloadOf<Action extends KnownAction> = z.infer<(typeof eventPayloads)[Action]>

/** Form of the payload of an action: the fixed one, or any object of ids, digests, numbers, codes and reasons. */
export function payloadForm(action: string): z.ZodType {
  return Object.hasOwn(eventPayloads, action) ? eventPayloads[action as KnownAction] : freeForm
}

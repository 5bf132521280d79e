import { z } from 'zod'
import {
  countForm,
  entryNumberForm,
  hexForm,
  idForm,
  integerTextForm,
  schemaName,
  textForm,
} from '../forms.ts'

const leftOut = z.discriminatedUnion('kind', [
  z.strictObject({
    kind: z.literal('entry'),
    id: idForm,
    number: entryNumberForm,
    reason: z.enum(['not-sealed', 'not-chosen']),
  }),
  z.strictObject({ kind: z.literal('raw'), id: idForm, number: z.null(), reason: z.literal('by-choice') }),
])

/** bundle.json: what is in the bundle, where, and what was left out and why (shapes 2). */
export const descriptionForm = z.strictObject({
  schema: schemaName('bundle/1'),
  laboratory: idForm,
  release: textForm,
  head: z.strictObject({ treeSize: countForm, rootHash: hexForm, keySha256: hexForm }),
  /** The ledger key in force at export, which signed the tag manifest. */
  bagKeySha256: hexForm,
  entries: z.array(
    z.strictObject({ entryId: idForm, number: entryNumberForm, folder: z.string().regex(/^N-\d+-\d+$/) }),
  ),
  /** `path` relative to data/. */
  raw: z.array(z.strictObject({ fileId: idForm, path: textForm, size: integerTextForm, sha256: hexForm })),
  leftOut: z.array(leftOut),
})
export type BundleDescription = z.infer<typeof descriptionForm>
export type LeftOut = BundleDescription['leftOut'][number]

/** One inclusion proof in proofs.json, against the bundle's head. */
export const proofsForm = z.array(
  z.strictObject({ sequence: countForm, leafHash: hexForm, path: z.array(hexForm) }),
)
export type Proofs = z.infer<typeof proofsForm>

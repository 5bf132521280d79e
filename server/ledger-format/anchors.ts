import { z } from 'zod'
import { canonicalBytes } from './canonical-json.ts'
import { checkForm, hexForm, idForm, schemaName } from './forms.ts'

/** Digests of a laboratory's root keys (shapes 4), given to auditors apart from any bundle. */
export const anchorsForm = z.strictObject({
  schema: schemaName('anchors/1'),
  laboratory: idForm,
  /** SHA-256 of the certificate (DER). */
  caSha256: hexForm,
  /** SHA-256 of each ledger key (SPKI DER), first to current. */
  ledgerKeysSha256: z.array(hexForm),
  /** SHA-256 of the first manager's enrolment. */
  rootEnrolmentSha256: hexForm,
  /** SHA-256 of every time-stamp authority's root ever used (DER), sorted. */
  tsaRootsSha256: z.array(hexForm),
})
export type Anchors = z.infer<typeof anchorsForm>

export function buildAnchors(parts: Omit<Anchors, 'schema'>): Anchors {
  const anchors: Anchors = {
    schema: 'halfsilver-anchors/1',
    ...parts,
    tsaRootsSha256: [...new Set(parts.tsaRootsSha256)].sort(),
  }
  checkForm(anchorsForm, anchors)
  return anchors
}

export function anchorsBytes(anchors: Anchors): Uint8Array {
  return canonicalBytes(anchors)
}

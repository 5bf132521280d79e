import { z } from 'zod'
import { canonicalBytes } from './canonical-json.ts'
import { toBase64 } from './digest.ts'
import { isUsablePublicKey } from './ed25519.ts'
import { base64Form, checkForm, hexForm, idForm, schemaName, textForm, timeForm } from './forms.ts'

/** What a new key signs about itself (shapes 5); its digest (SHA-256 of the JCS) names the key everywhere. */
export const enrolmentForm = z.strictObject({
  schema: schemaName('enrolment/1'),
  laboratory: idForm,
  id: idForm,
  subjectId: idForm,
  name: textForm,
  publicKey: base64Form(32),
  supersedes: hexForm.nullable(),
  policyVersion: textForm,
  statement: textForm,
  time: timeForm,
})
export type Enrolment = z.infer<typeof enrolmentForm>

/** @throws when the public key is no usable one (not canonical, or of small order). */
export function buildEnrolment(
  parts: Omit<Enrolment, 'schema' | 'publicKey'> & { publicKey: Uint8Array },
): Enrolment {
  if (!isUsablePublicKey(parts.publicKey))
    throw new Error('This public key cannot be used: it is not canonical or of small order.')
  const enrolment: Enrolment = {
    schema: 'halfsilver-enrolment/1',
    ...parts,
    publicKey: toBase64(parts.publicKey),
  }
  checkForm(enrolmentForm, enrolment)
  return enrolment
}

/** The bytes that the new key signs. */
export function enrolmentBytes(enrolment: Enrolment): Uint8Array {
  return canonicalBytes(enrolment)
}

import { z } from 'zod'
import { canonicalBytes } from './canonical-json.ts'
import { base64Form, checkForm, hexForm, idForm, schemaName, textForm, timeForm } from './forms.ts'

/** What another person signs about a new key after an identity check (shapes 5). */
export const endorsementForm = z.strictObject({
  schema: schemaName('endorsement/1'),
  laboratory: idForm,
  id: idForm,
  enrolmentSha256: hexForm,
  subjectId: idForm,
  publicKey: base64Form(32),
  endorser: z.strictObject({
    subjectId: idForm,
    name: textForm,
    role: z.enum(['manager', 'supervisor']),
    enrolmentSha256: hexForm,
  }),
  /** How the identity was checked. */
  identity: textForm,
  statement: textForm,
  time: timeForm,
})
export type Endorsement = z.infer<typeof endorsementForm>

export function buildEndorsement(parts: Omit<Endorsement, 'schema'>): Endorsement {
  const endorsement: Endorsement = { schema: 'halfsilver-endorsement/1', ...parts }
  checkForm(endorsementForm, endorsement)
  if (endorsement.endorser.subjectId === endorsement.subjectId)
    throw new Error('Nobody endorses a key of his own.')
  return endorsement
}

/** The bytes that the endorser's key signs. */
export function endorsementBytes(endorsement: Endorsement): Uint8Array {
  return canonicalBytes(endorsement)
}

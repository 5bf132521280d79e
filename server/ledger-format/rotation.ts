import { z } from 'zod'
import { canonicalBytes } from './canonical-json.ts'
import { sha256Hex, toBase64 } from './digest.ts'
import { spkiOf } from './ed25519.ts'
import { base64Form, checkForm, hexForm, idForm, schemaName, timeForm } from './forms.ts'

/** What both keys sign when the ledger key changes (shapes 4, end). `from`, `to`: SHA-256 of the SPKI. */
export const rotationStatementForm = z.strictObject({
  schema: schemaName('rotation/1'),
  laboratory: idForm,
  from: hexForm,
  to: hexForm,
  publicKey: base64Form(32),
  time: timeForm,
})
export type RotationStatement = z.infer<typeof rotationStatementForm>

export const rotationForm = z.strictObject({
  statement: rotationStatementForm,
  signatureFrom: base64Form(64),
  signatureTo: base64Form(64),
})
export type Rotation = z.infer<typeof rotationForm>

export function buildRotationStatement(parts: {
  laboratory: string
  from: string
  newPublicKey: Uint8Array
  time: string
}): RotationStatement {
  const statement: RotationStatement = {
    schema: 'halfsilver-rotation/1',
    laboratory: parts.laboratory,
    from: parts.from,
    to: sha256Hex(spkiOf(parts.newPublicKey)),
    publicKey: toBase64(parts.newPublicKey),
    time: parts.time,
  }
  checkForm(rotationStatementForm, statement)
  return statement
}

/** The bytes that the old and the new ledger key sign. */
export function rotationStatementBytes(statement: RotationStatement): Uint8Array {
  return canonicalBytes(statement)
}

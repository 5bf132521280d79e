import { z } from 'zod'
import { canonicalBytes } from './canonical-json.ts'
import { checkForm, countForm, hexForm, idForm, schemaName, timeForm } from './forms.ts'

/** A signed statement of the whole ledger at one size (shapes 4); the signature is Ed25519 over `headBytes`. */
export const headForm = z.strictObject({
  schema: schemaName('head/1'),
  laboratory: idForm,
  epoch: countForm,
  treeSize: countForm,
  rootHash: hexForm,
  lastDigest: hexForm,
  time: timeForm,
  previous: z.strictObject({ treeSize: countForm, rootHash: hexForm }).nullable(),
  keySha256: hexForm,
})
export type Head = z.infer<typeof headForm>

export function buildHead(parts: Omit<Head, 'schema'>): Head {
  const head: Head = { schema: 'halfsilver-head/1', ...parts }
  checkForm(headForm, head)
  return head
}

/** The bytes that the ledger key signs. */
export function headBytes(head: Head): Uint8Array {
  return canonicalBytes(head)
}

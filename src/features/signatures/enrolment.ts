import { enrolmentForm, type Enrolment } from '../../../server/ledger-format/enrolment.ts'
import { endorsementForm, type Endorsement } from '../../../server/ledger-format/endorsement.ts'
import { parseCanonical } from '../../../server/ledger-format/canonical-json.ts'
import { fromBase64, sha256Hex, toBase64 } from '../../../server/ledger-format/digest.ts'
import { signMessage, verifySignature } from '../../../server/ledger-format/ed25519.ts'
import { checkForm } from '../../../server/ledger-format/forms.ts'
import { endorsementStatement, enrolmentStatement } from '../../../server/ledger-format/statements.ts'
import { call } from '../../lib/call.ts'
import { createKey, deriveKeys, newKdf, withSigningKey, wrapKey } from './signing.ts'

interface Owner {
  id: string
  name: string
}

/** The server prepared a statement that says something else than agreed. Nothing was signed. */
function refuse(what: string): never {
  throw new Error(`The statement to sign ${what}. Nothing was signed; tell the laboratory manager.`)
}

/**
 * Makes a key on this device, lets it sign its own statement, and leaves with the server only what the passphrase has to
 * open. @throws {ApiProblem} or an Error in words; nothing is enrolled then.
 */
export async function enrolKey(
  passphrase: string,
  owner: Owner,
  laboratory: { id: string; name: string },
  onProgress?: (share: number) => void,
) {
  const { seed, publicKey } = createKey()
  const kdf = newKdf()
  const { wrappingKey, proof } = await deriveKeys(passphrase, kdf, onProgress)
  try {
    const prepared = await call('prepareEnrolment', { body: { publicKey: toBase64(publicKey) } })
    const bytes = fromBase64(prepared.document)
    checkEnrolment(parseEnrolment(bytes), owner, laboratory, toBase64(publicKey))
    const signature = toBase64(signMessage(seed, bytes))
    const wrapped = await wrapKey(seed, wrappingKey)
    return await call('putSigningKey', {
      body: { enrolmentId: prepared.id, signature, kdf, ...wrapped, proofSha256: sha256Hex(proof) },
    })
  } finally {
    for (const secret of [seed, wrappingKey, proof]) secret.fill(0)
  }
}

function parseEnrolment(bytes: Uint8Array): Enrolment {
  const value: unknown = parseCanonical(bytes)
  checkForm(enrolmentForm, value)
  return value
}

function checkEnrolment(
  enrolment: Enrolment,
  owner: Owner,
  laboratory: { id: string; name: string },
  publicKey: string,
): void {
  if (enrolment.laboratory !== laboratory.id) refuse('belongs to another laboratory')
  if (enrolment.subjectId !== owner.id || enrolment.name !== owner.name) refuse('names another person')
  if (enrolment.publicKey !== publicKey) refuse('names another key than the one made here')
  if (enrolment.statement !== enrolmentStatement({ name: owner.name, laboratory: laboratory.name }))
    refuse('has other words')
}

export interface CheckedEnrolment {
  enrolment: Enrolment
  enrolmentSha256: string
  /** The 16 digits that both people compare, in groups of four. */
  digits: string
}

/** A person's enrolment as sent, checked here: its key signed it, and its digest is the one named. */
export function checkedEnrolment(sent: {
  document: string
  signature: string
  enrolmentSha256: string
}): CheckedEnrolment {
  const bytes = fromBase64(sent.document)
  const enrolment = parseEnrolment(bytes)
  if (sha256Hex(bytes) !== sent.enrolmentSha256)
    throw new Error('The enrolment is not the one that its digest names.')
  if (!verifySignature(fromBase64(enrolment.publicKey), bytes, fromBase64(sent.signature)))
    throw new Error('The enrolment is not signed by the key that it names.')
  return { enrolment, enrolmentSha256: sent.enrolmentSha256, digits: keyDigits(sent.enrolmentSha256) }
}

/** First 16 hex digits of an enrolment's digest, in groups of four, as both people compare them. */
export function keyDigits(enrolmentSha256: string): string {
  return (enrolmentSha256.slice(0, 16).match(/.{4}/g) ?? []).join(' ')
}

/** Endorses another person's key with my own. `identity` says how the person was checked. */
export function endorseKey(
  passphrase: string,
  person: CheckedEnrolment,
  identity: string,
  endorser: Owner,
  laboratory: { id: string; name: string },
  onProgress?: (share: number) => void,
) {
  const id = person.enrolment.subjectId
  return withSigningKey(
    passphrase,
    async (sign) => {
      const prepared = await call('prepareEndorsement', {
        params: { id },
        body: { enrolmentSha256: person.enrolmentSha256, identity },
      })
      const bytes = fromBase64(prepared.document)
      checkEndorsement(bytes, person, identity, endorser, laboratory)
      return call('putEndorsement', {
        params: { id, endorsementId: prepared.id },
        body: { signature: sign(bytes) },
      })
    },
    onProgress,
  )
}

function checkEndorsement(
  bytes: Uint8Array,
  person: CheckedEnrolment,
  identity: string,
  endorser: Owner,
  laboratory: { id: string; name: string },
): void {
  const value: unknown = parseCanonical(bytes)
  checkForm(endorsementForm, value)
  const endorsement: Endorsement = value
  const { enrolment, enrolmentSha256 } = person
  if (endorsement.laboratory !== laboratory.id) refuse('belongs to another laboratory')
  if (endorsement.subjectId !== enrolment.subjectId || endorsement.enrolmentSha256 !== enrolmentSha256)
    refuse('is about another key')
  if (endorsement.publicKey !== enrolment.publicKey) refuse('is about another key')
  if (endorsement.endorser.subjectId !== endorser.id) refuse('names another endorser')
  if (endorsement.identity !== identity) refuse('describes another check of identity')
  const parts = { endorser: endorser.name, person: enrolment.name, laboratory: laboratory.name }
  if (endorsement.statement !== endorsementStatement({ ...parts, keyDigits: enrolmentSha256.slice(0, 16) }))
    refuse('has other words')
}

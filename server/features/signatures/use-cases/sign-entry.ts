import { Problem } from '../../../contract/problems.ts'
import type { Meaning } from '../../../contract/signatures.ts'
import { canonicalBytes, parseCanonical } from '../../../ledger-format/canonical-json.ts'
import { sha256Hex } from '../../../ledger-format/digest.ts'
import { verifySignature } from '../../../ledger-format/ed25519.ts'
import type { SignedRecord } from '../../../ledger-format/record.ts'
import type { Transaction } from '../../../platform/db/database.ts'
import type { Actor } from '../../../platform/http/actor.ts'
import type { Services } from '../../../platform/services.ts'
import { updateEntry, type EntryRow } from '../../entries/index.ts'
import { makeHead, stamp } from '../../laboratory/index.ts'
import { appendEvent } from '../../ledger/index.ts'
import { blocksOf } from '../blocks.ts'
import { buildEntryBody } from '../build-body.ts'
import { gather } from '../gather.ts'
import { tellWitnesses } from '../letters.ts'
import {
  dropPrepared,
  insertSignature,
  livingSignatures,
  preparedByDigest,
  type PreparedRow,
} from '../repository.ts'
import { requireSigner, type Signer } from '../signing-policy.ts'
import { requireSigning, standingOf, type Standing } from '../standing.ts'
import { earlierOf } from './prepare-record.ts'

export interface GivenSignature {
  meaning: Meaning
  recordSha256: string
  /** Raw 64 bytes. */
  signature: Buffer
}

/** How long the answer waits for the time-stamp authority; a job catches up with what fails. */
const STAMP_AT_ONCE_MS = 2000

/**
 * Takes a signature over prepared bytes and moves the state. Under the locks of person and entry everything that the record
 * says is compared with what holds now; the last signature needed seals the entry. Answers the signature's id.
 */
export async function signEntry(
  services: Services,
  { personId }: Pick<Actor, 'personId'>,
  entryId: string,
  given: GivenSignature,
): Promise<string> {
  const id = await services.db.transaction(async (t) => {
    const standing = await standingOf(services, personId, entryId, t)
    requireSigning(standing, given.meaning)
    const prepared = await requirePrepared(services, { personId, entryId, ...given }, t)
    const record = parseCanonical(prepared.record) as unknown as SignedRecord
    await requireUnchanged(services, standing, record, t)
    const signer = await requireSigner(services, personId, t)
    requireOwnSignature(signer, record, prepared, given.signature)
    await recordSignature(services, standing, record, prepared, given, t)
    return record.signing.id
  })
  try {
    await stamp(services, given.signature, STAMP_AT_ONCE_MS)
  } catch (error) {
    services.log.warn({ err: error, signature: id }, 'signed, not yet time-stamped')
  }
  return id
}

async function requirePrepared(
  services: Services,
  wanted: { personId: string; entryId: string; meaning: Meaning; recordSha256: string },
  t: Transaction,
): Promise<PreparedRow> {
  const prepared = await preparedByDigest(services.db, wanted, t)
  if (!prepared)
    throw new Problem(
      'record-changed',
      'These are not bytes that were prepared for you to sign here. Nothing was signed; open the entry again.',
    )
  if (prepared.expiresAt <= services.clock.now())
    throw new Problem(
      'record-expired',
      'What you looked at was prepared more than 15 minutes ago. Nothing was signed; open the entry again.',
    )
  return prepared
}

/** The record must say what holds now: the living signatures, and the same body. */
async function requireUnchanged(
  services: Services,
  { entry, living }: Standing,
  record: SignedRecord,
  t: Transaction,
): Promise<void> {
  const changed = new Problem(
    'record-changed',
    'The entry has changed since you looked at it. Nothing was signed; read it again and sign then.',
  )
  const earlier = [...living.map(earlierOf)].sort((a, b) =>
    a.time + a.recordSha256 < b.time + b.recordSha256 ? -1 : 1,
  )
  if (sha256Hex(canonicalBytes(earlier)) !== sha256Hex(canonicalBytes(record.signing.earlier))) throw changed
  if (entry.bodySha256 !== null) {
    if (entry.bodySha256 !== record.bodySha256) throw changed
    return
  }
  const gathered = await gather(services, entry, t)
  const blocks = await blocksOf(services, gathered, t)
  if (blocks.length > 0)
    throw new Problem(
      'signing-blocked',
      `The entry cannot be signed any more: ${blocks.map(({ detail }) => detail).join(' ')}`,
      { extra: { blocks } },
    )
  if ((await buildEntryBody(services, gathered, t)).bodySha256 !== record.bodySha256) throw changed
}

function requireOwnSignature(
  { key }: Signer,
  record: SignedRecord,
  prepared: PreparedRow,
  signature: Buffer,
): void {
  const { certificateSha256, enrolmentSha256 } = record.signing.signer
  if (key.certificateSha256 !== certificateSha256 || key.enrolmentSha256 !== enrolmentSha256)
    throw new Problem(
      'record-changed',
      'Your signing key is another than when this was prepared. Nothing was signed; open the entry again.',
    )
  if (!verifySignature(key.publicKey, prepared.record, signature))
    throw new Problem(
      'invalid-values',
      'The signature is not one of your key over these bytes. Nothing was signed.',
      {
        errors: [
          { pointer: '/signature', detail: 'It does not verify (strict Ed25519) under your public key.' },
        ],
      },
    )
}

async function recordSignature(
  services: Services,
  { entry, person }: Standing,
  record: SignedRecord,
  prepared: PreparedRow,
  { meaning, recordSha256, signature }: GivenSignature,
  t: Transaction,
): Promise<void> {
  const { id, time, signer } = record.signing
  const signatureSha256 = sha256Hex(signature)
  const next = await nextState(services, entry, record, person.id, t)
  await dropPrepared(services.db, entry.id, person.id, t)
  await updateEntry(
    services.db,
    entry.id,
    { ...next, bodySha256: record.bodySha256 },
    services.clock.now(),
    t,
  )
  await services.queue.send(
    'stamp-signature',
    { signatureId: id },
    { transaction: t, startAfter: 3, retryLimit: 12 },
  )
  if (next.phase === 'with-witness' && entry.phase !== 'with-witness') await tellWitnesses(services, entry, t)
  const actor = { kind: 'person', id: person.id, onBehalfOf: null } as const
  const payload = { recordSha256, signatureSha256, meaning, bodySha256: record.bodySha256 }
  const event = await appendEvent(services, t, {
    actor,
    action: 'entry.signed',
    subject: { kind: 'entry', id: entry.id },
    payload,
  })
  await insertSignature(
    services.db,
    {
      id,
      entryId: entry.id,
      personId: person.id,
      meaning,
      recordSha256,
      record: prepared.record,
      bodySha256: record.bodySha256,
      signature,
      signatureSha256,
      certificateSha256: signer.certificateSha256,
      signedAt: new Date(time),
      eventSequence: event.sequence,
    },
    t,
  )
  if (next.state === 'sealed') await seal(services, entry, record.bodySha256, t)
}

/** Where the entry stands with this signature: collecting until all authors, submitted until all witnesses signed. */
async function nextState(
  services: Services,
  entry: EntryRow,
  record: SignedRecord,
  personId: string,
  t: Transaction,
): Promise<Pick<EntryRow, 'state' | 'phase' | 'submittedAt'>> {
  const signed = [
    ...(await livingSignatures(services.db, entry.id, t)),
    { personId, meaning: record.signing.meaning },
  ]
  const by = (wanted: (meaning: Meaning) => boolean) =>
    new Set(signed.filter(({ meaning }) => wanted(meaning)).map((s) => s.personId))
  if (record.signing.meaning === 'authorship') {
    const authors = by((meaning) => meaning === 'authorship')
    const complete = record.authors.every(
      ({ subjectId, exception }) => exception !== null || authors.has(subjectId),
    )
    return complete
      ? { state: 'submitted', phase: 'with-witness', submittedAt: services.clock.now() }
      : { state: 'draft', phase: 'collecting', submittedAt: null }
  }
  const barred = [...record.authors, ...record.contributors].some(({ subjectId }) => subjectId === personId)
  if (barred)
    throw new Problem('not-allowed', 'You supplied something of this entry, so you cannot be its witness.')
  const witnesses = by((meaning) => meaning !== 'authorship')
  return witnesses.size >= record.entry.witnessesRequired
    ? { state: 'sealed', phase: 'sealed', submittedAt: entry.submittedAt }
    : { state: 'submitted', phase: 'with-witness', submittedAt: entry.submittedAt }
}

/** The seal: its event, that of the entry it amends, a head over both, and the job that makes the evidence. */
async function seal(services: Services, entry: EntryRow, bodySha256: string, t: Transaction): Promise<void> {
  const signatures = (await livingSignatures(services.db, entry.id, t)).map(
    ({ recordSha256 }) => recordSha256,
  )
  const actor = { kind: 'system', id: null, onBehalfOf: null } as const
  await appendEvent(services, t, {
    actor,
    action: 'entry.sealed',
    subject: { kind: 'entry', id: entry.id },
    payload: { bodySha256, signatures },
  })
  if (entry.amendsEntryId !== null)
    await appendEvent(services, t, {
      actor,
      action: 'entry.amended',
      subject: { kind: 'entry', id: entry.amendsEntryId },
      payload: { byEntryId: entry.id, bodySha256 },
    })
  await makeHead(services, t)
  await services.queue.send('render-evidence', { entryId: entry.id }, { transaction: t, retryLimit: 12 })
}

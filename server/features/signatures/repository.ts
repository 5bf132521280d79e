import type { Meaning } from '../../contract/signatures.ts'
import type { Database, Transaction } from '../../platform/db/database.ts'

export interface SignatureRow {
  id: string
  entryId: string
  personId: string
  meaning: Meaning
  recordSha256: string
  record: Buffer
  bodySha256: string
  signature: Buffer
  signatureSha256: string
  certificateSha256: string
  /** The time that the record says; the event comes up to 15 minutes later. */
  signedAt: Date
  eventSequence: string
  voidedAt: Date | null
}

const SIGNATURE = `s.id, s.entry_id as "entryId", s.person_id as "personId", s.meaning, s.record_sha256 as "recordSha256",
  s.record, s.body_sha256 as "bodySha256", s.signature, s.signature_sha256 as "signatureSha256",
  s.certificate_sha256 as "certificateSha256", s.signed_at as "signedAt", s.event_sequence as "eventSequence",
  v.voided_at as "voidedAt"`
const FROM = `from record.signatures s left join record.voidings v on v.record_sha256 = s.record_sha256`

/** All signatures of entries, living and voided, in the order of their events. */
export function signaturesOf(
  db: Database,
  entryIds: readonly string[],
  t?: Transaction,
): Promise<SignatureRow[]> {
  if (entryIds.length === 0) return Promise.resolve([])
  return db.rows<SignatureRow>(
    `select ${SIGNATURE} ${FROM} where s.entry_id in (:entryIds) order by s.event_sequence`,
    { entryIds },
    t,
  )
}

export async function livingSignatures(
  db: Database,
  entryId: string,
  t?: Transaction,
): Promise<SignatureRow[]> {
  return (await signaturesOf(db, [entryId], t)).filter(({ voidedAt }) => voidedAt === null)
}

export async function insertSignature(
  db: Database,
  row: Omit<SignatureRow, 'voidedAt' | 'eventSequence'> & { eventSequence: number },
  t: Transaction,
): Promise<void> {
  await db.run(
    `insert into record.signatures (id, entry_id, person_id, meaning, record_sha256, record, body_sha256, signature,
       signature_sha256, certificate_sha256, signed_at, event_sequence)
     values (:id, :entryId, :personId, :meaning, :recordSha256, :record, :bodySha256, :signature,
       :signatureSha256, :certificateSha256, :signedAt, :eventSequence)`,
    { ...row },
    t,
  )
}

export interface PreparedRow {
  sha256: string
  record: Buffer
  bodySha256: string
  expiresAt: Date
}

const PREPARED = `sha256, record, body_sha256 as "bodySha256", expires_at as "expiresAt"`

interface PreparedFor {
  entryId: string
  personId: string
  meaning: Meaning
}

/** The bytes prepared for this state before, while they are valid. */
export function findPrepared(
  db: Database,
  wanted: PreparedFor & { stateKey: string; now: Date },
  t: Transaction,
): Promise<PreparedRow | null> {
  return db.row<PreparedRow>(
    `select ${PREPARED} from work.prepared_records
     where entry_id = :entryId and person_id = :personId and meaning = :meaning and state_key = :stateKey and expires_at > :now
     order by created_at desc limit 1`,
    { ...wanted },
    t,
  )
}

/** The bytes of a digest, as prepared for this person, entry and meaning and nobody else. */
export function preparedByDigest(
  db: Database,
  wanted: PreparedFor & { recordSha256: string },
  t: Transaction,
): Promise<PreparedRow | null> {
  return db.row<PreparedRow>(
    `select ${PREPARED} from work.prepared_records
     where sha256 = :recordSha256 and entry_id = :entryId and person_id = :personId and meaning = :meaning`,
    { ...wanted },
    t,
  )
}

export async function keepPrepared(
  db: Database,
  row: PreparedFor & PreparedRow & { stateKey: string; createdAt: Date },
  t: Transaction,
): Promise<void> {
  await db.run(
    'delete from work.prepared_records where entry_id = :entryId and expires_at <= :createdAt',
    { ...row },
    t,
  )
  await db.run(
    `insert into work.prepared_records (sha256, entry_id, person_id, meaning, state_key, record, body_sha256, created_at, expires_at)
     values (:sha256, :entryId, :personId, :meaning, :stateKey, :record, :bodySha256, :createdAt, :expiresAt)`,
    { ...row },
    t,
  )
}

/** A prepared record is used once. */
export async function dropPrepared(
  db: Database,
  entryId: string,
  personId: string,
  t: Transaction,
): Promise<void> {
  await db.run(
    'delete from work.prepared_records where entry_id = :entryId and person_id = :personId',
    { entryId, personId },
    t,
  )
}

/** Keeps the bytes of a body; the same body again is the same row. */
export async function keepBody(
  db: Database,
  row: { sha256: string; entryId: string; body: Buffer; builtAt: Date },
  t: Transaction,
): Promise<void> {
  await db.run(
    `insert into record.bodies (sha256, entry_id, body, built_at) values (:sha256, :entryId, :body, :builtAt) on conflict do nothing`,
    { ...row },
    t,
  )
}

export async function bodyBytes(db: Database, sha256: string, t?: Transaction): Promise<Buffer> {
  const row = await db.row<{ body: Buffer }>(
    'select body from record.bodies where sha256 = :sha256',
    { sha256 },
    t,
  )
  if (!row) throw new Error(`The body ${sha256} is missing.`)
  return row.body
}

export interface ReturnRow {
  kind: 'returned' | 'reopened'
  byPerson: string
  byName: string
  reason: string
  at: Date
}

/** Returns and reopenings of an entry, oldest first. */
export function returnsOf(db: Database, entryId: string, t?: Transaction): Promise<ReturnRow[]> {
  return db.rows<ReturnRow>(
    `select r.kind, r.by_person as "byPerson", p.name as "byName", r.reason, r.at
     from record.returns r join work.people p on p.id = r.by_person where r.entry_id = :entryId order by r.at`,
    { entryId },
    t,
  )
}

/** Authors who were excepted from signing, with the reason. */
export function exceptionsOf(db: Database, entryId: string, t?: Transaction) {
  return db.rows<{ personId: string; reason: string; byPerson: string; at: Date }>(
    `select person_id as "personId", reason, by_person as "byPerson", at from record.author_exceptions where entry_id = :entryId`,
    { entryId },
    t,
  )
}

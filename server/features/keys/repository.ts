import type { z } from 'zod'
import type { Role } from '../../contract/common.ts'
import type { keyStatuses } from '../../contract/people.ts'
import type { kdfSchema } from '../../contract/signatures.ts'
import type { Database, Transaction } from '../../platform/db/database.ts'

export type KeyStatus = (typeof keyStatuses)[number]
export type Kdf = z.infer<typeof kdfSchema>

/** An enrolled key with its certificate and the state of its lock. */
export interface KeyRow {
  enrolmentId: string
  personId: string
  enrolmentSha256: string
  document: Buffer
  signature: Buffer
  /** Raw, 32 bytes. */
  publicKey: Buffer
  root: boolean
  enrolledAt: Date
  kdf: Kdf
  iv: Buffer
  failures: number
  lockedUntil: Date | null
  certificate: string | null
  certificateSha256: string | null
  notAfter: Date | null
  revokedAt: Date | null
}

const KEY = `e.id as "enrolmentId", e.person_id as "personId", e.sha256 as "enrolmentSha256", e.document, e.signature,
  e.public_key as "publicKey", e.root, e.enrolled_at as "enrolledAt", k.kdf, k.iv, k.failures, k.locked_until as "lockedUntil",
  c.pem as certificate, c.sha256 as "certificateSha256", c.not_after as "notAfter", r.revoked_at as "revokedAt"`
const FROM = `from record.enrolments e join work.signing_keys k on k.enrolment_id = e.id
  left join lateral (select * from record.certificates c where c.enrolment_id = e.id order by c.certified_at desc limit 1) c on true
  left join record.revocations r on r.enrolment_id = e.id`

/** Keys of people, newest first. */
export function keysOf(db: Database, personIds: readonly string[], t?: Transaction): Promise<KeyRow[]> {
  if (personIds.length === 0) return Promise.resolve([])
  return db.rows<KeyRow>(
    `select ${KEY} ${FROM} where e.person_id in (:personIds) order by e.enrolled_at desc, e.id`,
    { personIds },
    t,
  )
}

export function keyStatus(key: KeyRow, now: Date): KeyStatus {
  if (key.revokedAt) return 'revoked'
  if (!key.certificate || !key.notAfter) return 'awaiting-endorsement'
  if (key.notAfter <= now) return 'expired'
  return key.lockedUntil && key.lockedUntil > now ? 'locked' : 'active'
}

/**
 * The key that counts for a person: one that can sign, though a successor may wait for its endorsement; else the newest.
 * @param keys of one person, newest first
 */
export function currentKey(keys: readonly KeyRow[], now: Date): KeyRow | null {
  const usable = keys.find((key) => ['active', 'locked'].includes(keyStatus(key, now)))
  return usable ?? keys[0] ?? null
}

export interface PersonToSign {
  id: string
  name: string
  email: string | null
  roles: Role[]
}

/** An active person, the row locked until the transaction ends: whatever concerns their keys comes one after another. */
export function lockPerson(db: Database, id: string, t: Transaction): Promise<PersonToSign | null> {
  return db.row<PersonToSign>(
    `select id, name, email, roles from work.people where id = :id and active for no key update`,
    { id },
    t,
  )
}

/** Mail addresses of active managers. */
export async function managerAddresses(db: Database, t: Transaction): Promise<string[]> {
  const rows = await db.rows<{ email: string }>(
    `select email from work.people where active and email is not null and 'manager' = any (roles) order by email`,
    {},
    t,
  )
  return rows.map(({ email }) => email)
}

export interface PendingDocument {
  id: string
  personId: string
  document: Buffer
  expiresAt: Date
}

export async function keepPending(
  db: Database,
  pending: PendingDocument & { kind: 'enrolment' | 'endorsement' },
  t: Transaction,
): Promise<void> {
  await db.run(
    `insert into work.pending_documents (id, person_id, kind, document, expires_at)
     values (:id, :personId, :kind, :document, :expiresAt)`,
    { ...pending },
    t,
  )
}

/** Takes a prepared document out, so that it is used once; null when there is none of this person and kind. */
export async function takePending(
  db: Database,
  wanted: { id: string; personId: string; kind: 'enrolment' | 'endorsement' },
  t: Transaction,
): Promise<PendingDocument | null> {
  const row = await db.row<PendingDocument>(
    `select id, person_id as "personId", document, expires_at as "expiresAt" from work.pending_documents
     where id = :id and person_id = :personId and kind = :kind for update`,
    wanted,
    t,
  )
  if (row) await db.run('delete from work.pending_documents where id = :id', { id: row.id }, t)
  return row
}

export async function insertEnrolment(
  db: Database,
  row: Pick<
    KeyRow,
    | 'enrolmentId'
    | 'personId'
    | 'enrolmentSha256'
    | 'document'
    | 'signature'
    | 'publicKey'
    | 'root'
    | 'enrolledAt'
  >,
  t: Transaction,
): Promise<void> {
  await db.run(
    `insert into record.enrolments (id, person_id, sha256, document, signature, public_key, root, enrolled_at)
     values (:enrolmentId, :personId, :enrolmentSha256, :document, :signature, :publicKey, :root, :enrolledAt)`,
    { ...row },
    t,
  )
}

export async function insertSigningKey(
  db: Database,
  row: {
    enrolmentId: string
    personId: string
    kdf: Kdf
    wrappedKey: Buffer
    iv: Buffer
    proofDigest: Buffer
  },
  t: Transaction,
): Promise<void> {
  await db.run(
    `insert into work.signing_keys (enrolment_id, person_id, kdf, wrapped_key, iv, proof_digest)
     values (:enrolmentId, :personId, :kdf, :wrappedKey, :iv, :proofDigest)`,
    { ...row, kdf: JSON.stringify(row.kdf) },
    t,
  )
}

/** What opens a key, with the row locked: parallel guesses are counted one after another. */
export function lockSigningKey(db: Database, enrolmentId: string, t: Transaction) {
  return db.row<{
    wrappedKey: Buffer
    iv: Buffer
    proofDigest: Buffer
    failures: number
    lockedUntil: Date | null
  }>(
    `select wrapped_key as "wrappedKey", iv, proof_digest as "proofDigest", failures, locked_until as "lockedUntil"
     from work.signing_keys where enrolment_id = :enrolmentId for update`,
    { enrolmentId },
    t,
  )
}

export async function setFailures(
  db: Database,
  enrolmentId: string,
  state: { failures: number; lockedUntil: Date | null },
  t: Transaction,
): Promise<void> {
  await db.run(
    'update work.signing_keys set failures = :failures, locked_until = :lockedUntil where enrolment_id = :enrolmentId',
    { enrolmentId, ...state },
    t,
  )
}

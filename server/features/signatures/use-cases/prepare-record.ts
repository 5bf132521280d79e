import { randomUUID } from 'node:crypto'
import type { Role } from '../../../contract/common.ts'
import { Problem } from '../../../contract/problems.ts'
import type { Meaning } from '../../../contract/signatures.ts'
import { canonicalBytes } from '../../../ledger-format/canonical-json.ts'
import { sha256Hex } from '../../../ledger-format/digest.ts'
import {
  buildRecord,
  describeBody,
  overlaps,
  type BuiltBody,
  type Signing,
} from '../../../ledger-format/record.ts'
import { signingStatement } from '../../../ledger-format/statements.ts'
import type { Transaction } from '../../../platform/db/database.ts'
import type { Actor } from '../../../platform/http/actor.ts'
import type { Services } from '../../../platform/services.ts'
import { cutRevision, openingsOf, type EntryRow } from '../../entries/index.ts'
import { policyVersion } from '../../keys/index.ts'
import { laboratory } from '../../laboratory/index.ts'
import { newestEvent } from '../../ledger/index.ts'
import { blocksOf } from '../blocks.ts'
import { buildEntryBody } from '../build-body.ts'
import { gather } from '../gather.ts'
import { release } from '../release.ts'
import { bodyBytes, findPrepared, keepBody, keepPrepared, type SignatureRow } from '../repository.ts'
import { requireSigner, type Signer } from '../signing-policy.ts'
import { requireSigning, standingOf, type Standing } from '../standing.ts'

export interface RecordRequest {
  meaning: Meaning
  runId?: string
  from?: string
  to?: string
}

const VALID_MS = 15 * 60_000

/**
 * The exact bytes that a person is to sign now. The same state gives the same bytes for 15 minutes. The first signature's
 * preparation cuts a revision when there are saves since the last one; later signers get the body that the first signed.
 */
export async function prepareRecord(
  services: Services,
  { personId }: Pick<Actor, 'personId'>,
  entryId: string,
  request: RecordRequest,
): Promise<{ bytes: Buffer; sha256: string }> {
  return services.db.transaction(async (t) => {
    const standing = await standingOf(services, personId, entryId, t)
    requireSigning(standing, request.meaning)
    const signer = await requireSigner(services, personId, t)
    const body = await bodyToSign(services, standing, t)
    const parts = await signingParts(services, standing, signer, body, request, t)
    const wanted = {
      entryId,
      personId,
      meaning: request.meaning,
      stateKey: sha256Hex(canonicalBytes({ ...parts, body: body.bodySha256 })),
    }
    const now = services.clock.now()
    const known = await findPrepared(services.db, { ...wanted, now }, t)
    if (known) return { bytes: known.record, sha256: known.sha256 }
    const { bytes, recordSha256 } = buildRecord(body, {
      ...parts,
      id: randomUUID(),
      time: await notBeforeLedger(services, now, t),
      ledger: await newestEvent(services, t),
    })
    const record = Buffer.from(bytes)
    const expiresAt = new Date(now.getTime() + VALID_MS)
    await keepPrepared(
      services.db,
      { ...wanted, record, sha256: recordSha256, bodySha256: body.bodySha256, createdAt: now, expiresAt },
      t,
    )
    return { bytes: record, sha256: recordSha256 }
  })
}

async function bodyToSign(services: Services, { entry }: Standing, t: Transaction): Promise<BuiltBody> {
  if (entry.bodySha256 !== null) return describeBody(await bodyBytes(services.db, entry.bodySha256, t))
  const gathered = await gather(services, entry, t)
  const blocks = await blocksOf(services, gathered, t)
  if (blocks.length > 0)
    throw new Problem(
      'signing-blocked',
      `The entry cannot be signed yet: ${blocks.map(({ detail }) => detail).join(' ')}`,
      { extra: { blocks } },
    )
  const revised = await cutRevision(services, t, entry, 'signature')
  const body = await buildEntryBody(services, { ...gathered, entry: revised }, t)
  await keepBody(
    services.db,
    {
      sha256: body.bodySha256,
      entryId: entry.id,
      body: Buffer.from(body.bytes),
      builtAt: services.clock.now(),
    },
    t,
  )
  return body
}

type SigningParts = Omit<Signing, 'id' | 'time' | 'ledger'>

async function signingParts(
  services: Services,
  { entry, living, person }: Standing,
  { key, enrolment }: Signer,
  body: BuiltBody,
  request: RecordRequest,
  t: Transaction,
): Promise<SigningParts> {
  const home = await laboratory(services, t)
  const { meaning } = request
  const presence = meaning === 'witness-present' ? requirePresence(body, request) : null
  const subject = { laboratory: body.body.laboratory.name, ...body.body.entry }
  return {
    meaning,
    statement: signingStatement(meaning, subject, presence?.stated),
    signer: {
      subjectId: person.id,
      name: enrolment.name,
      role: signingRole(person.roles, meaning),
      certificateSha256: key.certificateSha256,
      enrolmentSha256: key.enrolmentSha256,
    },
    zone: home.zone,
    presentFor: presence?.presentFor ?? null,
    opened: meaning === 'authorship' ? null : await openedBy(services, entry, person.id, t),
    release,
    policyVersion,
    earlier: living.map(earlierOf),
  }
}

/** In which role a person signs: a witness as supervisor, an author in the role that lets them write. */
function signingRole(roles: readonly Role[], meaning: Meaning): Role {
  if (meaning !== 'authorship') return 'supervisor'
  return roles.includes('experimentalist') ? 'experimentalist' : 'supervisor'
}

function requirePresence(body: BuiltBody, { runId, from, to }: RecordRequest) {
  const run = body.body.runs.find(({ id }) => id === runId)
  if (!runId || !run || !from || !to)
    throw new Problem(
      'invalid-values',
      'Say at which run of this entry you were present, from when to when.',
      {
        errors: [
          { pointer: '/runId', detail: 'Give runId, from and to; the run must be filed in this entry.' },
        ],
      },
    )
  if (from > to || !overlaps({ from, to }, run))
    throw new Problem('invalid-values', `The time that you give does not overlap the run ${run.number}.`, {
      errors: [{ pointer: '/from', detail: `The run began at ${run.startedAt}.` }],
    })
  return { presentFor: { runId, from, to }, stated: { run: run.number, from, to } }
}

async function openedBy(
  services: Services,
  entry: EntryRow,
  personId: string,
  t: Transaction,
): Promise<Signing['opened']> {
  const openings = await openingsOf(services, entry, personId, t)
  return openings.map(({ kind, id, time }) => ({ kind, id, time: time.toISOString() }))
}

/** A living signature as a later one names it. */
export function earlierOf({
  recordSha256,
  signatureSha256,
  meaning,
  personId,
  signedAt,
}: SignatureRow): Signing['earlier'][number] {
  return { recordSha256, signatureSha256, meaning, subjectId: personId, time: signedAt.toISOString() }
}

async function notBeforeLedger(services: Services, now: Date, t: Transaction): Promise<string> {
  const state = await services.db.row<{ at: Date | null }>(
    'select last_at as at from record.ledger_state',
    {},
    t,
  )
  return new Date(Math.max(now.getTime(), state?.at?.getTime() ?? 0)).toISOString()
}

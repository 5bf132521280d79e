import type { Entry } from '../../contract/entries.ts'
import type { EntrySignature } from '../../contract/signatures.ts'
import { parseJson } from '../../ledger-format/canonical-json.ts'
import type { SignedRecord } from '../../ledger-format/record.ts'
import type { Transaction } from '../../platform/db/database.ts'
import type { Services } from '../../platform/services.ts'
import { returnsOf, signaturesOf, type SignatureRow } from './repository.ts'

export type PlacedSignature = EntrySignature & { entryId: string }

interface StampRow {
  signatureSha256: string
  genTime: Date
  authority: string
  independent: boolean
}

/** Signatures of entries as they are shown, voided ones among them, in the order in which they were given. */
export async function entrySignatures(
  services: Pick<Services, 'db' | 'config'>,
  entryIds: readonly string[],
  t?: Transaction,
): Promise<PlacedSignature[]> {
  const rows = await signaturesOf(services.db, entryIds, t)
  const stamps = await stampsOf(services, rows, t)
  return rows.map((row) => {
    // What is shown is what was signed: name, role and sentence come from the record itself.
    const { signing } = parseJson(row.record) as unknown as SignedRecord
    return {
      entryId: row.entryId,
      id: row.id,
      meaning: row.meaning,
      statement: signing.statement,
      signer: { personId: row.personId, name: signing.signer.name, role: signing.signer.role },
      time: signing.time,
      recordSha256: row.recordSha256,
      timeStamp: presentStamp(services, stamps.get(row.signatureSha256)),
      voided: row.voidedAt !== null,
    }
  })
}

async function stampsOf(
  services: Pick<Services, 'db'>,
  rows: readonly SignatureRow[],
  t?: Transaction,
): Promise<Map<string, StampRow>> {
  if (rows.length === 0) return new Map()
  const stamps = await services.db.rows<StampRow>(
    `select signature_sha256 as "signatureSha256", gen_time as "genTime", authority, independent
     from record.time_stamps where signature_sha256 in (:digests)`,
    { digests: rows.map(({ signatureSha256 }) => signatureSha256) },
    t,
  )
  return new Map(stamps.map((row) => [row.signatureSha256, row]))
}

function presentStamp(
  { config }: Pick<Services, 'config'>,
  row: StampRow | undefined,
): EntrySignature['timeStamp'] {
  if (!row)
    return { status: 'pending', time: null, authority: null, independent: config.timeStamps.independent }
  return {
    status: 'stamped',
    time: row.genTime.toISOString(),
    authority: row.authority,
    independent: row.independent,
  }
}

/** The last return of an entry; null when it never came back. */
export async function lastReturn(
  services: Pick<Services, 'db'>,
  entryId: string,
): Promise<Entry['returned']> {
  const last = (await returnsOf(services.db, entryId)).filter(({ kind }) => kind === 'returned').at(-1)
  return last ? { reason: last.reason, by: last.byName, at: last.at.toISOString() } : null
}

/** Where the seal of an entry stands in the ledger; null before it. */
export async function sealOf(
  services: Pick<Services, 'db'>,
  entryId: string,
  t?: Transaction,
): Promise<Entry['seal']> {
  const row = await services.db.row<{ sequence: string; digest: string; at: Date }>(
    `select sequence, digest, at from record.events
     where subject_kind = 'entry' and subject_id = :entryId and action = 'entry.sealed'`,
    { entryId },
    t,
  )
  return row && { sequence: Number(row.sequence), digest: row.digest, time: row.at.toISOString() }
}

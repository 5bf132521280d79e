import type { Anchors } from '../../ledger-format/anchors.ts'
import { buildAnchors } from '../../ledger-format/anchors.ts'
import { parseCanonical } from '../../ledger-format/canonical-json.ts'
import { sha256Hex } from '../../ledger-format/digest.ts'
import type { Head } from '../../ledger-format/head.ts'
import type { Services } from '../../platform/services.ts'
import { X509Certificate } from 'node:crypto'

type Needs = Pick<Services, 'db'>

export interface StoredHead {
  head: Head
  /** Raw 64 bytes. */
  signature: Buffer
  /** RFC 3161 response over the signature, DER; null until it came. */
  timeStamp: Buffer | null
  /** The revocation list of that moment, PEM. */
  crl: string
}

interface Row {
  head: Buffer
  signature: Buffer
  timeStamp: Buffer | null
  crl: string
}

const HEAD = `select h.head, h.signature, h.crl, t.token as "timeStamp" from record.heads h
  left join record.time_stamps t on t.signature_sha256 = h.signature_sha256`

const stored = (row: Row): StoredHead => ({ ...row, head: parseCanonical(row.head) as unknown as Head })

/** The head of a tree size, or the newest one. */
export async function findHead(services: Needs, treeSize?: number): Promise<StoredHead | null> {
  const row =
    treeSize === undefined
      ? await services.db.row<Row>(`${HEAD} order by h.tree_size desc limit 1`)
      : await services.db.row<Row>(`${HEAD} where h.tree_size = :treeSize`, { treeSize })
  return row && stored(row)
}

export async function allHeads(services: Needs): Promise<StoredHead[]> {
  return (await services.db.rows<Row>(`${HEAD} order by h.tree_size`)).map(stored)
}

/** Raw public keys of the ledger, first to current, each with its digest and the rotation that led to it. */
export function ledgerKeys(services: Needs) {
  return services.db.rows<{ sha256: string; publicKey: Buffer; rotation: Buffer | null }>(
    'select sha256, public_key as "publicKey", rotation from record.ledger_keys order by position',
  )
}

/** Digests of the laboratory's root keys; null before the first manager enrolled. */
export async function anchors(services: Needs): Promise<Anchors | null> {
  const row = await services.db.row<{ id: string; certificate: string; root: string | null }>(
    `select id, ca_certificate as certificate, (select sha256 from record.enrolments where root) as root from record.laboratory`,
  )
  if (!row?.root) return null
  const roots = await services.db.rows<{ sha256: string }>('select sha256 from record.tsa_roots')
  return buildAnchors({
    laboratory: row.id,
    caSha256: sha256Hex(new X509Certificate(row.certificate).raw),
    ledgerKeysSha256: (await ledgerKeys(services)).map(({ sha256 }) => sha256),
    rootEnrolmentSha256: row.root,
    tsaRootsSha256: roots.map(({ sha256 }) => sha256),
  })
}

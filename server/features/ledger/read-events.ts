import { parseCanonical } from '../../ledger-format/canonical-json.ts'
import { fromHex } from '../../ledger-format/digest.ts'
import type { LedgerEvent, Subject } from '../../ledger-format/event.ts'
import { MerkleTree } from '../../ledger-format/merkle.ts'
import type { Transaction } from '../../platform/db/database.ts'
import type { Services } from '../../platform/services.ts'

type Needs = Pick<Services, 'db'>

/** All events of the given subjects, by sequence. */
export async function eventsOf(
  services: Needs,
  subjects: readonly Subject[],
  t?: Transaction,
): Promise<LedgerEvent[]> {
  if (subjects.length === 0) return []
  const rows = await services.db.rows<{ canonical: Buffer }>(
    `select canonical from record.events where (subject_kind, subject_id) in
       (select * from unnest(array[:kinds]::text[], array[:ids]::uuid[])) order by sequence`,
    { kinds: subjects.map(({ kind }) => kind), ids: subjects.map(({ id }) => id) },
    t,
  )
  return rows.map(({ canonical }) => parseCanonical(canonical) as unknown as LedgerEvent)
}

/** Where the chain of a subject ends now; null when it has no event. */
export async function chainEnd(
  services: Needs,
  { kind, id }: Subject,
  t?: Transaction,
): Promise<{ subjectSequence: number; digest: string } | null> {
  const row = await services.db.row<{ sequence: string; digest: string }>(
    `select subject_sequence as sequence, digest from record.events
     where subject_kind = :kind and subject_id = :id order by subject_sequence desc limit 1`,
    { kind, id },
    t,
  )
  return row && { subjectSequence: Number(row.sequence), digest: row.digest }
}

/** The newest event: sequence and leaf hash, which tells nothing of what it is. */
export async function newestEvent(
  services: Needs,
  t?: Transaction,
): Promise<{ sequence: number; leafHash: string }> {
  const row = await services.db.row<{ sequence: string; leafHash: string }>(
    `select sequence, leaf_hash as "leafHash" from record.events order by sequence desc limit 1`,
    {},
    t,
  )
  if (!row) throw new Error('The ledger is empty.')
  return { sequence: Number(row.sequence), leafHash: row.leafHash }
}

const trees = new WeakMap<object, { leaves: Uint8Array[]; tree: MerkleTree }>()

/** The Merkle tree over all committed events; leaf hashes already read are kept, since they never change. */
export async function merkleTree(services: Needs): Promise<MerkleTree> {
  const known = trees.get(services.db) ?? { leaves: [], tree: new MerkleTree([]) }
  const rows = await services.db.rows<{ leafHash: string }>(
    'select leaf_hash as "leafHash" from record.events where sequence > :from order by sequence',
    { from: known.leaves.length },
  )
  if (rows.length === 0) return known.tree
  const leaves = [...known.leaves, ...rows.map(({ leafHash }) => fromHex(leafHash))]
  const tree = new MerkleTree(leaves)
  trees.set(services.db, { leaves, tree })
  return tree
}

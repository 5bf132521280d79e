import type { Database, Transaction } from '../../platform/db/database.ts'

/** A file of the evidence set of a sealed entry. */
export interface Rendition {
  entryId: string
  /** Path in the entry's folder of a bundle, for example calculations/C1/result.json. */
  path: string
  sha256: string
  sha512: string
  size: number
  objectKey: string
  objectVersion: string | null
}

/** The evidence set of an entry by path; empty until it was made. */
export async function renditionsOf(db: Database, entryId: string, t?: Transaction): Promise<Rendition[]> {
  const rows = await db.rows<Omit<Rendition, 'size'> & { size: string }>(
    `select entry_id as "entryId", path, sha256, sha512, size, object_key as "objectKey", object_version as "objectVersion"
     from record.renditions where entry_id = :entryId order by path`,
    { entryId },
    t,
  )
  return rows.map((row) => ({ ...row, size: Number(row.size) }))
}

export async function insertRendition(db: Database, row: Rendition, t: Transaction): Promise<void> {
  await db.run(
    `insert into record.renditions (entry_id, path, sha256, sha512, size, object_key, object_version)
     values (:entryId, :path, :sha256, :sha512, :size, :objectKey, :objectVersion)`,
    { ...row },
    t,
  )
}

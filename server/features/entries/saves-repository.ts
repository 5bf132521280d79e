import { gunzipSync, gzipSync } from 'node:zlib'
import type { Transaction } from 'sequelize'
import type { Database } from '../../platform/db/database.ts'

/** One save of the text: the whole document, compressed; appended, never changed. */
export interface Save {
  entryId: string
  number: number
  personId: string
  tokenId: string | null
  savedAt: Date
  contentSha256: string
}

export interface Revision {
  revision: number
  personId: string
  author: string
  at: Date
  cause: string
  saveNumber: number
  contentSha256: string
}

export type Document = { type: 'doc'; content?: unknown[] }

export async function insertSave(db: Database, save: Save, content: Document, t: Transaction): Promise<void> {
  await db.run(
    `insert into record.saves (entry_id, number, person_id, token_id, saved_at, content_gzip, content_sha256)
     values (:entryId, :number, :personId, :tokenId, :savedAt, :gzip, :contentSha256)`,
    { ...save, gzip: gzipSync(JSON.stringify(content)) },
    t,
  )
}

const SAVE = `entry_id as "entryId", number, person_id as "personId", token_id as "tokenId", saved_at as "savedAt",
  content_sha256 as "contentSha256"`

export function findSave(
  db: Database,
  entryId: string,
  number: number,
  t?: Transaction,
): Promise<Save | null> {
  return db.row<Save>(
    `select ${SAVE} from record.saves where entry_id = :entryId and number = :number`,
    { entryId, number },
    t,
  )
}

/** The document of a save; null when there is no such save. */
export async function contentOfSave(
  db: Database,
  entryId: string,
  number: number,
  t?: Transaction,
): Promise<Document | null> {
  const row = await db.row<{ gzip: Buffer }>(
    `select content_gzip as gzip from record.saves where entry_id = :entryId and number = :number`,
    { entryId, number },
    t,
  )
  return row === null ? null : (JSON.parse(gunzipSync(row.gzip).toString('utf8')) as Document)
}

/** When the text was first and last saved; null when it never was. */
export function writtenBetween(
  db: Database,
  entryId: string,
  t?: Transaction,
): Promise<{ first: Date; last: Date } | null> {
  return db.row<{ first: Date; last: Date }>(
    `select min(saved_at) as first, max(saved_at) as last from record.saves where entry_id = :entryId having count(*) > 0`,
    { entryId },
    t,
  )
}

export async function insertRevision(
  db: Database,
  revision: Omit<Revision, 'author'> & { entryId: string; tokenId: string | null },
  t: Transaction,
): Promise<void> {
  await db.run(
    `insert into record.revisions (entry_id, revision, person_id, token_id, at, cause, save_number, content_sha256)
     values (:entryId, :revision, :personId, :tokenId, :at, :cause, :saveNumber, :contentSha256)`,
    { ...revision },
    t,
  )
}

const REVISION = `r.revision, r.person_id as "personId", p.name as author, r.at, r.cause, r.save_number as "saveNumber",
  r.content_sha256 as "contentSha256"`

export function revisionsOf(db: Database, entryId: string, t?: Transaction): Promise<Revision[]> {
  return db.rows<Revision>(
    `select ${REVISION} from record.revisions r join work.people p on p.id = r.person_id
     where r.entry_id = :entryId order by r.revision`,
    { entryId },
    t,
  )
}

/** People who saved the text, with names; also those whose last saves are not yet a revision. */
export function writersOf(
  db: Database,
  entryIds: readonly string[],
  t?: Transaction,
): Promise<{ entryId: string; personId: string; name: string }[]> {
  if (entryIds.length === 0) return Promise.resolve([])
  return db.rows(
    `select distinct s.entry_id as "entryId", s.person_id as "personId", p.name
     from record.saves s join work.people p on p.id = s.person_id where s.entry_id in (:entryIds) order by p.name`,
    { entryIds },
    t,
  )
}

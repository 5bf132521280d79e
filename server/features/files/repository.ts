import type { Transaction } from 'sequelize'
import type { Reading } from '../../contract/files.ts'
import type { Database } from '../../platform/db/database.ts'

/** A raw file as the database keeps it, with the entry and notebook it belongs to (through its run, if it has one). */
export interface FileRow {
  id: string
  entryId: string | null
  runId: string | null
  /** The entry that the file belongs to, directly or through its run; null while its run is unfiled. */
  homeEntryId: string | null
  notebookId: string
  name: string
  /** Bytes, as text: larger than a double holds exactly. */
  size: string
  sha256: string
  sha512: string
  objectKey: string
  objectVersion: string | null
  state: 'stored' | 'verified' | 'mismatch' | 'missing'
  uploadedBy: string
  uploadedByName: string
  via: 'browser' | 'token'
  uploadedAt: Date
  readingStatus: Reading['status']
  readingFormat: string | null
  readingVersion: number | null
  readingOptions: Record<string, unknown> | null
  readingSha256: string | null
  readingSummary: ReadingSummary | null
  readingDetail: string | null
  readingBy: string | null
  columnsKey: string | null
}

export type ReadingSummary = Omit<Reading, 'status' | 'format' | 'version' | 'options' | 'detail'>

/** The summary of a file that was not read, or holds no tags. */
export const nothingFound: ReadingSummary = {
  kind: null,
  tags: null,
  durationPs: null,
  firstPs: null,
  lastPs: null,
  resolutionPs: null,
  outOfOrder: null,
  channels: null,
}

const FILE = `f.id, f.entry_id as "entryId", f.run_id as "runId", coalesce(f.entry_id, r.entry_id) as "homeEntryId",
  coalesce(r.notebook_id, e.notebook_id) as "notebookId", f.name, f.size::text as size, f.sha256, f.sha512,
  f.object_key as "objectKey", f.object_version as "objectVersion", f.state, f.uploaded_by as "uploadedBy",
  p.name as "uploadedByName", f.via, f.uploaded_at as "uploadedAt", f.reading_status as "readingStatus",
  f.reading_format as "readingFormat", f.reading_version as "readingVersion", f.reading_options as "readingOptions",
  f.reading_sha256 as "readingSha256", f.reading_summary as "readingSummary", f.reading_detail as "readingDetail",
  f.reading_by as "readingBy", f.columns_key as "columnsKey"`
const FROM = `from work.files f left join work.runs r on r.id = f.run_id left join work.entries e on e.id = f.entry_id
  join work.people p on p.id = f.uploaded_by`

export function findFile(db: Database, id: string, t?: Transaction): Promise<FileRow | null> {
  return db.row<FileRow>(`select ${FILE} ${FROM} where f.id = :id`, { id }, t)
}

/** Files of an entry and of the runs filed in it, in order of upload. */
export function filesOfEntry(db: Database, entryId: string, t?: Transaction): Promise<FileRow[]> {
  return db.rows<FileRow>(
    `select ${FILE} ${FROM} where coalesce(f.entry_id, r.entry_id) = :entryId order by f.uploaded_at, f.id`,
    { entryId },
    t,
  )
}

export function filesOfRuns(db: Database, runIds: readonly string[], t?: Transaction): Promise<FileRow[]> {
  if (runIds.length === 0) return Promise.resolve([])
  return db.rows<FileRow>(
    `select ${FILE} ${FROM} where f.run_id in (:runIds) order by f.uploaded_at, f.id`,
    { runIds },
    t,
  )
}

/** Files with the same bytes in notebooks of this person; nothing tells of files elsewhere. */
export function filesWithSameBytes(
  db: Database,
  digests: readonly string[],
  personId: string,
): Promise<{ id: string; name: string; sha256: string }[]> {
  if (digests.length === 0) return Promise.resolve([])
  return db.rows(
    `select f.id, f.name, f.sha256 ${FROM} join work.members m
       on m.notebook_id = coalesce(r.notebook_id, e.notebook_id) and m.person_id = :personId
     where f.sha256 in (:digests) order by f.uploaded_at`,
    { digests, personId },
  )
}

export interface NewFile {
  id: string
  entryId: string | null
  runId: string | null
  name: string
  size: number
  sha256: string
  sha512: string
  objectKey: string
  objectVersion: string | null
  state: 'stored' | 'verified'
  uploadedBy: string
  via: 'browser' | 'token'
  uploadedAt: Date
}

export async function insertFile(db: Database, file: NewFile, t: Transaction): Promise<void> {
  await db.run(
    `insert into work.files (id, entry_id, run_id, name, size, sha256, sha512, object_key, object_version, state,
       uploaded_by, via, uploaded_at)
     values (:id, :entryId, :runId, :name, :size, :sha256, :sha512, :objectKey, :objectVersion, :state,
       :uploadedBy, :via, :uploadedAt)`,
    { ...file },
    t,
  )
}

export async function setFileState(
  db: Database,
  id: string,
  state: FileRow['state'],
  t?: Transaction,
): Promise<void> {
  await db.run(`update work.files set state = :state where id = :id`, { id, state }, t)
}

export interface StoredReading {
  status: 'ready' | 'unreadable'
  format: string | null
  version: number | null
  options: Record<string, unknown> | null
  sha256: string | null
  summary: ReadingSummary | null
  detail: string | null
  columnsKey: string | null
}

/** Keeps what a worker found; under the worker's own role. */
export async function storeReading(db: Database, fileId: string, reading: StoredReading): Promise<void> {
  await db.run(
    `update work.files set reading_status = :status, reading_format = :format, reading_version = :version,
       reading_options = :options, reading_sha256 = :sha256, reading_summary = :summary, reading_detail = :detail,
       columns_key = :columnsKey
     where id = :fileId`,
    {
      ...reading,
      fileId,
      options: reading.options === null ? null : JSON.stringify(reading.options),
      summary: reading.summary === null ? null : JSON.stringify(reading.summary),
    },
  )
}

/** Asks for another reading; the old columns are not used any more. */
export async function chooseReading(
  db: Database,
  fileId: string,
  choice: { format: string; options: Record<string, unknown>; by: string },
  t: Transaction,
): Promise<void> {
  await db.run(
    `update work.files set reading_status = 'pending', reading_format = :format, reading_options = :options,
       reading_by = :by, reading_sha256 = null, reading_summary = null, reading_detail = null where id = :fileId`,
    { fileId, format: choice.format, options: JSON.stringify(choice.options), by: choice.by },
    t,
  )
}

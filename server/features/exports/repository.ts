import type { ProblemBody } from '../../contract/problems.ts'
import type { Database, Transaction } from '../../platform/db/database.ts'

export interface ExportRow {
  id: string
  personId: string
  notebookId: string | null
  entryIds: string[]
  withoutRaw: boolean
  status: 'queued' | 'running' | 'waiting-for-time-stamp' | 'done' | 'failed'
  /** Name of the zip, without ending. */
  name: string | null
  objectKey: string | null
  objectVersion: string | null
  size: string | null
  sha256: string | null
  error: ProblemBody | null
  createdAt: Date
  expiresAt: Date
}

const EXPORT = `id, person_id as "personId", notebook_id as "notebookId", entry_ids as "entryIds", without_raw as "withoutRaw",
  status, name, object_key as "objectKey", object_version as "objectVersion", size, sha256, error,
  created_at as "createdAt", expires_at as "expiresAt"`

export function findExport(db: Database, id: string, t?: Transaction): Promise<ExportRow | null> {
  return db.row<ExportRow>(`select ${EXPORT} from work.exports where id = :id`, { id }, t)
}

export function exportsOf(db: Database, personId: string): Promise<ExportRow[]> {
  return db.rows<ExportRow>(
    `select ${EXPORT} from work.exports where person_id = :personId order by created_at desc limit 200`,
    {
      personId,
    },
  )
}

export async function insertExport(
  db: Database,
  row: Pick<
    ExportRow,
    'id' | 'personId' | 'notebookId' | 'entryIds' | 'withoutRaw' | 'createdAt' | 'expiresAt'
  >,
  t: Transaction,
): Promise<void> {
  await db.run(
    `insert into work.exports (id, person_id, notebook_id, entry_ids, without_raw, status, created_at, expires_at)
     values (:id, :personId, :notebookId, array[:entryIds]::uuid[], :withoutRaw, 'queued', :createdAt, :expiresAt)`,
    { ...row },
    t,
  )
}

export async function setStatus(
  db: Database,
  id: string,
  status: ExportRow['status'],
  error: ProblemBody | null = null,
): Promise<void> {
  await db.run('update work.exports set status = :status, error = :error where id = :id', {
    id,
    status,
    error: error && JSON.stringify(error),
  })
}

export async function finishExport(
  db: Database,
  id: string,
  done: {
    name: string
    entryIds: string[]
    objectKey: string
    objectVersion: string | null
    size: number
    sha256: string
  },
  t: Transaction,
): Promise<void> {
  await db.run(
    `update work.exports set status = 'done', name = :name, entry_ids = array[:entryIds]::uuid[], object_key = :objectKey,
       object_version = :objectVersion, size = :size, sha256 = :sha256, error = null where id = :id`,
    { id, ...done },
    t,
  )
}

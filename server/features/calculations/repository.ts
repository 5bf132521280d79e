import type { Transaction } from 'sequelize'
import type { Calculation, FigureText } from '../../contract/calculations.ts'
import type { ProblemBody } from '../../contract/problems.ts'
import type { Database } from '../../platform/db/database.ts'

/** An input as computed with: the bytes and the way they were read. `readingSha256` is null until the file is read. */
export interface FileInput {
  fileId: string
  sha256: string
  readingSha256: string | null
}

export interface CalculationRow {
  id: string
  entryId: string
  /** 2 for C2; a successor has the label of what it succeeds. */
  label: number
  kind: string
  version: number
  engine: string
  status: Calculation['status']
  progress: Calculation['progress']
  parameters: Record<string, unknown>
  inputs: FileInput[]
  cacheKey: string | null
  resultSha256: string | null
  figures: FigureText[]
  notes: { code: string; detail: string }[]
  worker: string | null
  error: ProblemBody | null
  supersedes: string | null
  createdBy: string
  createdAt: Date
  startedAt: Date | null
  finishedAt: Date | null
}

const CALCULATION = `id, entry_id as "entryId", label, kind, version, engine, status, progress, parameters, inputs,
  cache_key as "cacheKey", result_sha256 as "resultSha256", figures, notes, worker, error, supersedes,
  created_by as "createdBy", created_at as "createdAt", started_at as "startedAt", finished_at as "finishedAt"`

export function findCalculation(db: Database, id: string, t?: Transaction): Promise<CalculationRow | null> {
  return db.row<CalculationRow>(`select ${CALCULATION} from work.calculations where id = :id`, { id }, t)
}

export function calculationsOfEntry(
  db: Database,
  entryId: string,
  t?: Transaction,
): Promise<CalculationRow[]> {
  return db.rows<CalculationRow>(
    `select ${CALCULATION} from work.calculations where entry_id = :entryId order by label, created_at, id`,
    { entryId },
    t,
  )
}

/** A finished calculation with the same inputs, parameters and version, whoever made it. */
export function findKnown(db: Database, cacheKey: string, t?: Transaction): Promise<CalculationRow | null> {
  return db.row<CalculationRow>(
    `select ${CALCULATION} from work.calculations where cache_key = :cacheKey and status = 'done' order by finished_at limit 1`,
    { cacheKey },
    t,
  )
}

export async function takeNextLabel(db: Database, entryId: string, t: Transaction): Promise<number> {
  const row = await db.row<{ label: number }>(
    `update work.entries set next_label = next_label + 1 where id = :entryId returning next_label - 1 as label`,
    { entryId },
    t,
  )
  if (row === null) throw new Error(`entry ${entryId} is gone`)
  return row.label
}

export interface NewCalculation {
  id: string
  entryId: string
  label: number
  kind: string
  version: number
  engine: string
  parameters: Record<string, unknown>
  inputs: FileInput[]
  cacheKey: string | null
  supersedes: string | null
  createdBy: string
  tokenId: string | null
  createdAt: Date
}

export async function insertCalculation(
  db: Database,
  calculation: NewCalculation,
  t: Transaction,
): Promise<void> {
  await db.run(
    `insert into work.calculations (id, entry_id, label, kind, version, engine, status, parameters, inputs, cache_key,
       supersedes, created_by, token_id, created_at)
     values (:id, :entryId, :label, :kind, :version, :engine, 'queued', :parameters, :inputs, :cacheKey,
       :supersedes, :createdBy, :tokenId, :createdAt)`,
    {
      ...calculation,
      parameters: JSON.stringify(calculation.parameters),
      inputs: JSON.stringify(calculation.inputs),
    },
    t,
  )
}

/** Moves a queued calculation to running; false when somebody cancelled it or another worker holds it. */
export async function beginRun(db: Database, id: string, worker: string, startedAt: Date): Promise<boolean> {
  const rows = await db.rows(
    `update work.calculations set status = 'running', worker = :worker, started_at = :startedAt, progress = null
     where id = :id and status in ('queued', 'running') returning id`,
    { id, worker, startedAt },
  )
  return rows.length === 1
}

export async function setProgress(
  db: Database,
  id: string,
  progress: NonNullable<Calculation['progress']>,
): Promise<void> {
  await db.run(`update work.calculations set progress = :progress where id = :id and status = 'running'`, {
    id,
    progress: JSON.stringify(progress),
  })
}

export interface Finished {
  inputs: FileInput[]
  cacheKey: string
  resultSha256: string
  figures: FigureText[]
  notes: { code: string; detail: string }[]
  worker: string
  startedAt: Date
  finishedAt: Date
}

/** Moves to done; false when it was cancelled meanwhile. */
export async function finish(db: Database, id: string, finished: Finished, t: Transaction): Promise<boolean> {
  const rows = await db.rows(
    `update work.calculations set status = 'done', progress = null, inputs = :inputs, cache_key = :cacheKey,
       result_sha256 = :resultSha256, figures = :figures, notes = :notes, worker = :worker, started_at = :startedAt,
       finished_at = :finishedAt
     where id = :id and status in ('queued', 'running') returning id`,
    {
      ...finished,
      id,
      inputs: JSON.stringify(finished.inputs),
      figures: JSON.stringify(finished.figures),
      notes: JSON.stringify(finished.notes),
    },
    t,
  )
  return rows.length === 1
}

export async function fail(db: Database, id: string, error: ProblemBody, finishedAt: Date): Promise<void> {
  await db.run(
    `update work.calculations set status = 'failed', progress = null, error = :error, finished_at = :finishedAt
     where id = :id and status in ('queued', 'running')`,
    { id, error: JSON.stringify(error), finishedAt },
  )
}

export async function cancel(db: Database, id: string, finishedAt: Date, t: Transaction): Promise<boolean> {
  const rows = await db.rows(
    `update work.calculations set status = 'cancelled', progress = null, finished_at = :finishedAt
     where id = :id and status in ('queued', 'running') returning id`,
    { id, finishedAt },
    t,
  )
  return rows.length === 1
}

export async function insertResult(
  db: Database,
  sha256: string,
  bytes: Uint8Array,
  t: Transaction,
): Promise<void> {
  await db.run(
    `insert into record.results (sha256, result) values (:sha256, :result) on conflict (sha256) do nothing`,
    { sha256, result: Buffer.from(bytes) },
    t,
  )
}

/** The bytes that the worker wrote. */
export async function resultBytes(db: Database, sha256: string, t?: Transaction): Promise<Buffer> {
  const row = await db.row<{ result: Buffer }>(
    `select result from record.results where sha256 = :sha256`,
    { sha256 },
    t,
  )
  if (row === null) throw new Error(`result ${sha256} is missing`)
  return row.result
}

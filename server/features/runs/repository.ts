import type { Transaction } from 'sequelize'
import type { Experiment } from '../../contract/common.ts'
import type { Condition, RunApparatus } from '../../contract/runs.ts'
import type { Database } from '../../platform/db/database.ts'

export interface RunRow {
  id: string
  number: number
  notebookId: string
  entryId: string | null
  experiment: Experiment
  startedAt: Date
  /** Declared acquisition time in ps, as text; null when not declared. */
  durationPs: string | null
  conditions: Condition[]
  apparatus: RunApparatus[]
  cautions: { code: string; acknowledgedBy: string; time: string }[]
  createdBy: string
  createdAt: Date
}

const RUN = `id, number, notebook_id as "notebookId", entry_id as "entryId", experiment, started_at as "startedAt",
  duration_ps::text as "durationPs", conditions, apparatus, cautions, created_by as "createdBy", created_at as "createdAt"`

/** R-0612: four digits at least. */
export function runNumber(number: number): string {
  return `R-${String(number).padStart(4, '0')}`
}

export function findRun(db: Database, id: string, t?: Transaction): Promise<RunRow | null> {
  return db.row<RunRow>(`select ${RUN} from work.runs where id = :id`, { id }, t)
}

export function lockRun(db: Database, id: string, t: Transaction): Promise<RunRow | null> {
  return db.row<RunRow>(`select ${RUN} from work.runs where id = :id for update`, { id }, t)
}

export function runsOfEntry(db: Database, entryId: string, t?: Transaction): Promise<RunRow[]> {
  return db.rows<RunRow>(
    `select ${RUN} from work.runs where entry_id = :entryId order by number`,
    { entryId },
    t,
  )
}

export function runsOfNotebook(
  db: Database,
  notebookId: string,
  before: number,
  limit: number,
): Promise<RunRow[]> {
  return db.rows<RunRow>(
    `select ${RUN} from work.runs where notebook_id = :notebookId and number < :before order by number desc limit :limit`,
    { notebookId, before, limit },
  )
}

export interface NewRun {
  id: string
  notebookId: string
  experiment: Experiment
  startedAt: Date
  durationPs: string | null
  conditions: Condition[]
  apparatus: RunApparatus[]
  createdBy: string
  createdAt: Date
}

export async function insertRun(db: Database, run: NewRun, t: Transaction): Promise<void> {
  await db.run(
    `insert into work.runs (id, notebook_id, experiment, started_at, duration_ps, conditions, apparatus, created_by, created_at)
     values (:id, :notebookId, :experiment, :startedAt, :durationPs, :conditions, :apparatus, :createdBy, :createdAt)`,
    { ...run, conditions: JSON.stringify(run.conditions), apparatus: JSON.stringify(run.apparatus) },
    t,
  )
}

export async function fileRunIn(db: Database, id: string, entryId: string, t: Transaction): Promise<void> {
  await db.run(`update work.runs set entry_id = :entryId where id = :id`, { id, entryId }, t)
}

export async function updateRun(
  db: Database,
  id: string,
  run: Pick<RunRow, 'experiment' | 'startedAt' | 'durationPs' | 'conditions' | 'apparatus'>,
  t: Transaction,
): Promise<void> {
  await db.run(
    `update work.runs set experiment = :experiment, started_at = :startedAt, duration_ps = :durationPs,
       conditions = :conditions, apparatus = :apparatus where id = :id`,
    {
      id,
      experiment: run.experiment,
      startedAt: run.startedAt,
      durationPs: run.durationPs,
      conditions: JSON.stringify(run.conditions),
      apparatus: JSON.stringify(run.apparatus),
    },
    t,
  )
}

import type { Transaction } from 'sequelize'
import type { Experiment } from '../../contract/common.ts'
import type { EntryPhase, EntryState } from '../../contract/policy.ts'
import type { Database } from '../../platform/db/database.ts'

/** An entry as the database keeps it. */
export interface EntryRow {
  id: string
  notebookId: string
  notebookNumber: number
  notebookTitle: string
  /** Witnesses this entry needs: the notebook's number, two at least when marked important. */
  witnessesRequired: number
  serial: number
  title: string
  experiment: Experiment
  runAt: Date
  /** Date of the run in the laboratory's zone: 2026-03-02. */
  workDate: string
  lateRemark: string | null
  important: boolean
  state: EntryState
  phase: EntryPhase
  revision: number
  saveNumber: number
  contentSha256: string
  bodySha256: string | null
  amendsEntryId: string | null
  amendsBodySha256: string | null
  submittedAt: Date | null
  createdBy: string
  createdAt: Date
  updatedAt: Date
}

const ENTRY = `e.id, e.notebook_id as "notebookId", n.number as "notebookNumber", n.title as "notebookTitle",
  case when e.important then greatest(n.witnesses_required, 2) else n.witnesses_required end as "witnessesRequired",
  e.serial, e.title, e.experiment, e.run_at as "runAt", to_char(e.work_date, 'YYYY-MM-DD') as "workDate",
  e.late_remark as "lateRemark", e.important, e.state, e.phase, e.revision, e.save_number as "saveNumber",
  e.content_sha256 as "contentSha256", e.body_sha256 as "bodySha256", e.amends_entry_id as "amendsEntryId",
  e.amends_body_sha256 as "amendsBodySha256", e.submitted_at as "submittedAt", e.created_by as "createdBy",
  e.created_at as "createdAt", e.updated_at as "updatedAt"`
const FROM = `from work.entries e join work.notebooks n on n.id = e.notebook_id`

/** N-07/042: three digits at least. */
export function entryNumber(entry: Pick<EntryRow, 'notebookNumber' | 'serial'>): string {
  return `N-${String(entry.notebookNumber).padStart(2, '0')}/${String(entry.serial).padStart(3, '0')}`
}

export function findEntry(db: Database, id: string, t?: Transaction): Promise<EntryRow | null> {
  return db.row<EntryRow>(`select ${ENTRY} ${FROM} where e.id = :id`, { id }, t)
}

/** The entry with its row locked until the transaction ends: signatures, saves and returns come one after another. */
export function lockEntry(db: Database, id: string, t: Transaction): Promise<EntryRow | null> {
  return db.row<EntryRow>(`select ${ENTRY} ${FROM} where e.id = :id for update of e`, { id }, t)
}

export function entriesOfNotebook(
  db: Database,
  notebookId: string,
  before: number,
  limit: number,
): Promise<EntryRow[]> {
  return db.rows<EntryRow>(
    `select ${ENTRY} ${FROM} where e.notebook_id = :notebookId and e.serial < :before order by e.serial desc limit :limit`,
    { notebookId, before, limit },
  )
}

/** Entries of the notebooks in which the person is a member, newest change first. */
export function entriesOfPerson(
  db: Database,
  personId: string,
  filter: { waiting: boolean; mine: boolean },
  offset: number,
  limit: number,
): Promise<EntryRow[]> {
  return db.rows<EntryRow>(
    `select ${ENTRY} ${FROM} join work.members m on m.notebook_id = n.id and m.person_id = :personId
     join work.people p on p.id = m.person_id and m.role = any (p.roles)
     where (not :waiting or (e.phase = 'with-witness' and m.role = 'supervisor' and not ${contributed('e.id', ':personId')}
        and not exists (select 1 from record.signatures s where s.entry_id = e.id and s.person_id = :personId
          and not exists (select 1 from record.voidings v where v.record_sha256 = s.record_sha256))))
       and (not :mine or e.created_by = :personId
        or exists (select 1 from record.saves s where s.entry_id = e.id and s.person_id = :personId))
     order by case when :waiting then e.submitted_at end, e.updated_at desc, e.id offset :offset limit :limit`,
    { personId, ...filter, offset, limit },
  )
}

export function waitingCount(db: Database, personId: string): Promise<number> {
  return entriesOfPerson(db, personId, { waiting: true, mine: false }, 0, 200).then((rows) => rows.length)
}

/** SQL: the person wrote, ran, uploaded, chose a reading or computed something of the entry. */
function contributed(entryId: string, personId: string): string {
  const files = `select 1 from work.files f left join work.runs r on r.id = f.run_id
    where coalesce(f.entry_id, r.entry_id) = ${entryId} and (f.uploaded_by = ${personId} or f.reading_by = ${personId})`
  return `(exists (select 1 from record.saves c where c.entry_id = ${entryId} and c.person_id = ${personId})
    or exists (select 1 from work.runs c where c.entry_id = ${entryId} and c.created_by = ${personId})
    or exists (${files})
    or exists (select 1 from work.calculations c where c.entry_id = ${entryId} and c.created_by = ${personId}))`
}

export async function hasContributed(
  db: Database,
  entryId: string,
  personId: string,
  t?: Transaction,
): Promise<boolean> {
  const row = await db.row<{ yes: boolean }>(
    `select ${contributed(':entryId', ':personId')} as yes`,
    { entryId, personId },
    t,
  )
  return row?.yes ?? false
}

export async function takeNextSerial(db: Database, notebookId: string, t: Transaction): Promise<number> {
  const row = await db.row<{ serial: number }>(
    `update work.notebooks set next_entry = next_entry + 1 where id = :notebookId returning next_entry - 1 as serial`,
    { notebookId },
    t,
  )
  if (row === null) throw new Error(`notebook ${notebookId} is gone`)
  return row.serial
}

export interface NewEntry {
  id: string
  notebookId: string
  serial: number
  title: string
  experiment: Experiment
  runAt: Date
  workDate: string
  contentSha256: string
  amendsEntryId: string | null
  amendsBodySha256: string | null
  createdBy: string
  createdAt: Date
}

export async function insertEntry(db: Database, entry: NewEntry, t: Transaction): Promise<void> {
  await db.run(
    `insert into work.entries (id, notebook_id, serial, title, experiment, run_at, work_date, content_sha256,
       amends_entry_id, amends_body_sha256, created_by, created_at, updated_at)
     values (:id, :notebookId, :serial, :title, :experiment, :runAt, :workDate, :contentSha256,
       :amendsEntryId, :amendsBodySha256, :createdBy, :createdAt, :createdAt)`,
    { ...entry },
    t,
  )
}

export interface EntryChange {
  title?: string
  experiment?: Experiment
  runAt?: Date
  workDate?: string
  lateRemark?: string | null
  important?: boolean
  state?: EntryState
  phase?: EntryPhase
  revision?: number
  saveNumber?: number
  contentSha256?: string
  bodySha256?: string | null
  submittedAt?: Date | null
}

const COLUMN: Record<keyof EntryChange, string> = {
  title: 'title',
  experiment: 'experiment',
  runAt: 'run_at',
  workDate: 'work_date',
  lateRemark: 'late_remark',
  important: 'important',
  state: 'state',
  phase: 'phase',
  revision: 'revision',
  saveNumber: 'save_number',
  contentSha256: 'content_sha256',
  bodySha256: 'body_sha256',
  submittedAt: 'submitted_at',
}

/** Changes columns of an entry; the caller holds its lock. */
export async function updateEntry(
  db: Database,
  id: string,
  change: EntryChange,
  updatedAt: Date,
  t: Transaction,
): Promise<void> {
  const names = (Object.keys(change) as (keyof EntryChange)[]).filter((name) => change[name] !== undefined)
  const assignments = [...names.map((name) => `${COLUMN[name]} = :${name}`), 'updated_at = :updatedAt']
  await db.run(
    `update work.entries set ${assignments.join(', ')} where id = :id`,
    { ...change, id, updatedAt },
    t,
  )
}

/** Entries that amend this one, sealed ones only when `sealed`. */
export function addendaOf(db: Database, id: string, t?: Transaction): Promise<EntryRow[]> {
  return db.rows<EntryRow>(
    `select ${ENTRY} ${FROM} where e.amends_entry_id = :id order by e.serial`,
    { id },
    t,
  )
}

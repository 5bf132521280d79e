import type { Transaction } from 'sequelize'
import type { Role } from '../../contract/common.ts'
import type { Membership } from '../../contract/policy.ts'
import type { Database } from '../../platform/db/database.ts'

export interface NotebookRow {
  id: string
  number: number
  title: string
  witnessesRequired: number
  createdAt: Date
  entries: number
}

export interface MemberRow extends Membership {
  notebookId: string
  personId: string
  login: string
  name: string
}

const NOTEBOOK = `n.id, n.number, n.title, n.witnesses_required as "witnessesRequired", n.created_at as "createdAt",
  n.next_entry - 1 as entries`

/** N-07: two digits at least. */
export function notebookNumber(number: number): string {
  return `N-${String(number).padStart(2, '0')}`
}

/** Notebooks in which the person is a member, by number, after the cursor. */
export function notebooksOf(
  db: Database,
  personId: string,
  after: number,
  limit: number,
): Promise<NotebookRow[]> {
  return db.rows<NotebookRow>(
    `select ${NOTEBOOK} from work.notebooks n join work.members m on m.notebook_id = n.id
     where m.person_id = :personId and n.number > :after order by n.number limit :limit`,
    { personId, after, limit },
  )
}

export function findNotebook(db: Database, id: string, t?: Transaction): Promise<NotebookRow | null> {
  return db.row<NotebookRow>(`select ${NOTEBOOK} from work.notebooks n where n.id = :id`, { id }, t)
}

export function membersOf(
  db: Database,
  notebookIds: readonly string[],
  t?: Transaction,
): Promise<MemberRow[]> {
  if (notebookIds.length === 0) return Promise.resolve([])
  return db.rows<MemberRow>(
    `select m.notebook_id as "notebookId", m.person_id as "personId", p.login, p.name, m.role, m.keeper
     from work.members m join work.people p on p.id = m.person_id
     where m.notebook_id in (:notebookIds) order by m.keeper desc, p.name`,
    { notebookIds },
    t,
  )
}

export function findMembership(
  db: Database,
  notebookId: string,
  personId: string,
  t?: Transaction,
): Promise<Membership | null> {
  return db.row<Membership>(
    `select role, keeper from work.members where notebook_id = :notebookId and person_id = :personId`,
    { notebookId, personId },
    t,
  )
}

export async function insertNotebook(
  db: Database,
  notebook: { id: string; title: string; createdBy: string; createdAt: Date },
  t: Transaction,
): Promise<void> {
  await db.run(
    `insert into work.notebooks (id, title, created_by, created_at) values (:id, :title, :createdBy, :createdAt)`,
    { ...notebook },
    t,
  )
}

export async function setTitle(db: Database, id: string, title: string, t: Transaction): Promise<void> {
  await db.run(`update work.notebooks set title = :title where id = :id`, { id, title }, t)
}

export async function upsertMember(
  db: Database,
  member: { notebookId: string; personId: string; role: Role; keeper: boolean; addedAt: Date },
  t: Transaction,
): Promise<void> {
  await db.run(
    `insert into work.members (notebook_id, person_id, role, keeper, added_at)
     values (:notebookId, :personId, :role, :keeper, :addedAt)
     on conflict (notebook_id, person_id) do update set role = excluded.role`,
    { ...member },
    t,
  )
}

export async function deleteMember(
  db: Database,
  notebookId: string,
  personId: string,
  t: Transaction,
): Promise<void> {
  await db.run(
    `delete from work.members where notebook_id = :notebookId and person_id = :personId`,
    { notebookId, personId },
    t,
  )
}

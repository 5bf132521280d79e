import type { Transaction } from 'sequelize'
import type { Role } from '../../contract/common.ts'
import type { Database } from '../../platform/db/database.ts'

export interface PersonRow {
  id: string
  login: string
  name: string
  email: string | null
  roles: Role[]
  active: boolean
}

const COLUMNS = `id, login, name, email, roles, active`

/** Every person ever known, by name; nobody is deleted. */
export function listPeople(db: Database): Promise<PersonRow[]> {
  return db.rows<PersonRow>(`select ${COLUMNS} from work.people order by name, id`)
}

export function findPerson(db: Database, id: string, t?: Transaction): Promise<PersonRow | null> {
  return db.row<PersonRow>(`select ${COLUMNS} from work.people where id = :id`, { id }, t)
}

/** People by id; unknown ids are absent from the map. */
export async function peopleById(
  db: Database,
  ids: readonly string[],
  t?: Transaction,
): Promise<Map<string, PersonRow>> {
  if (ids.length === 0) return new Map()
  const rows = await db.rows<PersonRow>(
    `select ${COLUMNS} from work.people where id in (:ids)`,
    { ids: [...new Set(ids)] },
    t,
  )
  return new Map(rows.map((person) => [person.id, person]))
}

export interface NewPerson {
  id: string
  login: string
  name: string
  email: string | null
  provider: string
  providerAccountId: string
  roles: Role[]
  createdAt: Date
}

export async function insertPerson(db: Database, person: NewPerson, t: Transaction): Promise<void> {
  await db.run(
    `insert into work.people (id, login, name, provider, provider_account_id, email, roles, created_at)
     values (:id, :login, :name, :provider, :providerAccountId, :email, array[:roles]::text[], :createdAt)`,
    { ...person },
    t,
  )
}

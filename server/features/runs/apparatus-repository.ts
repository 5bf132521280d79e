import type { Transaction } from 'sequelize'
import type { Apparatus } from '../../contract/runs.ts'
import type { Database } from '../../platform/db/database.ts'

/** The laboratory's equipment of one kind, by name. */
export function listApparatus(db: Database, kind: Apparatus['kind']): Promise<Apparatus[]> {
  return db.rows<Apparatus>(
    `select id, version, kind, name, figures from work.apparatus where kind = :kind order by name`,
    { kind },
  )
}

export function apparatusById(db: Database, ids: readonly string[], t?: Transaction): Promise<Apparatus[]> {
  if (ids.length === 0) return Promise.resolve([])
  return db.rows<Apparatus>(
    `select id, version, kind, name, figures from work.apparatus where id in (:ids)`,
    { ids },
    t,
  )
}

/** Adds a piece of equipment to the register. */
export async function insertApparatus(
  db: Database,
  apparatus: Apparatus,
  createdAt: Date,
  t: Transaction,
): Promise<void> {
  await db.run(
    `insert into work.apparatus (id, version, kind, name, figures, created_at) values (:id, :version, :kind, :name, :figures, :createdAt)`,
    { ...apparatus, figures: JSON.stringify(apparatus.figures), createdAt },
    t,
  )
}

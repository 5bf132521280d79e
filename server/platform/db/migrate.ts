import { readdirSync, readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import PgBoss from 'pg-boss'
import { SequelizeStorage, Umzug } from 'umzug'
import type { Logger } from '../logger.ts'
import { queueNames, queueSchema } from '../queue/queues.ts'
import { openDatabase, type Database } from './database.ts'

const folder = new URL('./migrations/', import.meta.url)

/**
 * Brings the database to the newest form, as its owner: SQL files in the order of their names, each in one transaction,
 * then the queues. Answers the names of the migrations it ran.
 */
export async function migrate(ownerUrl: string, log: Logger): Promise<string[]> {
  const db = openDatabase(ownerUrl, log, 2)
  try {
    const done = await migrations(db).up()
    await createQueues(ownerUrl, db, log)
    return done.map(({ name }) => name)
  } finally {
    await db.close()
  }
}

function migrations({ sequelize }: Database) {
  return new Umzug({
    migrations: readdirSync(fileURLToPath(folder))
      .filter((name) => name.endsWith('.sql'))
      .sort()
      .map((name) => ({
        name,
        async up() {
          const sql = readFileSync(new URL(name, folder), 'utf8')
          await sequelize.transaction((transaction) => sequelize.query(sql, { transaction }))
        },
      })),
    storage: new SequelizeStorage({ sequelize, tableName: 'migrations' }),
    logger: undefined,
  })
}

/** pg-boss makes its schema and a table per queue; both need the owner. The running processes get rows alone. */
async function createQueues(ownerUrl: string, db: Database, log: Logger) {
  const boss = new PgBoss({
    connectionString: ownerUrl,
    schema: queueSchema,
    supervise: false,
    schedule: false,
    max: 2,
  })
  boss.on('error', (error) => log.error({ err: error }, 'queue'))
  await boss.start()
  try {
    for (const name of queueNames) if (!(await boss.getQueue(name))) await boss.createQueue(name, { name })
  } finally {
    await boss.stop({ graceful: false, wait: true })
  }
  await db.run(`grant usage on schema ${queueSchema} to hs_app, hs_worker`)
  await db.run(
    `grant select, insert, update, delete on all tables in schema ${queueSchema} to hs_app, hs_worker`,
  )
}

import { QueryTypes, Sequelize, type Transaction } from 'sequelize'
import type { Logger } from '../logger.ts'

export type { Transaction }

/** Named values of a query: `:name` in the text. A list fills `in (:names)`; for an array column write `array[:names]::text[]`. */
export type Replacements = Record<string, unknown>

/**
 * The database under one role. BIGINT comes as a string, TIMESTAMPTZ as a Date, BYTEA as a Buffer, JSON parsed.
 * Values are written in by name and escaped; JSON values are given as text (`JSON.stringify`).
 * Inside `transaction` give `t` to every call: a call without it takes a second connection and sees the state before.
 */
export interface Database {
  sequelize: Sequelize
  /** Runs `work` in one transaction (read committed); an error rolls back and is thrown on. */
  transaction<T>(work: (t: Transaction) => Promise<T>): Promise<T>
  rows<T extends object>(sql: string, replacements?: Replacements, t?: Transaction): Promise<T[]>
  /** The one row, or null; a second row is an error of the query. */
  row<T extends object>(sql: string, replacements?: Replacements, t?: Transaction): Promise<T | null>
  /** Runs a statement that returns nothing; answers how many rows it touched. */
  run(sql: string, replacements?: Replacements, t?: Transaction): Promise<number>
  close(): Promise<void>
}

const MAX_CONNECTIONS = 20

export function openDatabase(url: string, log: Logger, maxConnections = MAX_CONNECTIONS): Database {
  const sequelize = new Sequelize(url, {
    dialect: 'postgres',
    logging: (sql) => log.trace({ sql }),
    pool: { max: maxConnections, min: 1, acquire: 60_000, idle: 30_000 },
    dialectOptions: { application_name: 'halfsilver' },
  })

  function rows<T extends object>(
    sql: string,
    replacements: Replacements = {},
    t?: Transaction,
  ): Promise<T[]> {
    return sequelize.query<T>(sql, { type: QueryTypes.SELECT, replacements, transaction: t, raw: true })
  }

  return {
    sequelize,
    transaction: (work) => sequelize.transaction(work),
    rows,
    async row<T extends object>(sql: string, replacements?: Replacements, t?: Transaction) {
      const found = await rows<T>(sql, replacements, t)
      if (found.length > 1) throw new Error(`a query for one row found ${found.length}: ${sql}`)
      return found[0] ?? null
    },
    async run(sql, replacements = {}, t) {
      return sequelize.query(sql, { type: QueryTypes.BULKUPDATE, replacements, transaction: t, raw: true })
    },
    close: () => sequelize.close(),
  }
}

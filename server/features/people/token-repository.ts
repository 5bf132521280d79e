import type { Transaction } from 'sequelize'
import type { Scope } from '../../platform/http/actor.ts'
import type { Database } from '../../platform/db/database.ts'

export interface TokenView {
  id: string
  name: string
  scopes: Scope[]
  createdAt: string
  lastUsedAt: string | null
  expiresAt: string
}

interface TokenRow extends Omit<TokenView, 'createdAt' | 'lastUsedAt' | 'expiresAt'> {
  createdAt: Date
  lastUsedAt: Date | null
  expiresAt: Date
}

/** Tokens of a person that are not ended, newest first; secrets are not kept, only their digests. */
export async function tokensOf(db: Database, personId: string): Promise<TokenView[]> {
  const rows = await db.rows<TokenRow>(
    `select id, name, scopes, created_at as "createdAt", last_used_at as "lastUsedAt", expires_at as "expiresAt"
     from work.tokens where person_id = :personId and revoked_at is null order by created_at desc`,
    { personId },
  )
  return rows.map((row) => ({
    ...row,
    createdAt: row.createdAt.toISOString(),
    lastUsedAt: row.lastUsedAt?.toISOString() ?? null,
    expiresAt: row.expiresAt.toISOString(),
  }))
}

export async function insertToken(
  db: Database,
  token: {
    id: string
    personId: string
    name: string
    scopes: Scope[]
    secretSha256: string
    createdAt: Date
    expiresAt: Date
  },
  t: Transaction,
): Promise<void> {
  await db.run(
    `insert into work.tokens (id, person_id, name, scopes, secret_sha256, created_at, expires_at)
     values (:id, :personId, :name, array[:scopes]::text[], :secretSha256, :createdAt, :expiresAt)`,
    { ...token },
    t,
  )
}

/** Ends a token at once; false when the person has no such token. */
export async function endToken(
  db: Database,
  id: string,
  personId: string,
  revokedAt: Date,
  t: Transaction,
): Promise<boolean> {
  const rows = await db.rows(
    `update work.tokens set revoked_at = :revokedAt where id = :id and person_id = :personId and revoked_at is null returning id`,
    { id, personId, revokedAt },
    t,
  )
  return rows.length === 1
}

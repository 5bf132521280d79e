import { createHash } from 'node:crypto'
import type { Role } from '../../contract/common.ts'
import type { Clock } from '../clock.ts'
import type { Database } from '../db/database.ts'

export type Scope = 'read' | 'record'

/** Who calls, loaded afresh for each request so that a change of rights works at once. */
export interface Actor {
  kind: 'person' | 'token'
  personId: string
  name: string
  login: string
  roles: Role[]
  /** Of a personal token; a person in a session has both. */
  scopes: Scope[]
  sessionId?: string
  tokenId?: string
}

interface PersonRow {
  id: string
  login: string
  name: string
  roles: Role[]
}

/** The person of a session, or null when the account has been closed. */
export async function personActor(db: Database, personId: string, sessionId: string): Promise<Actor | null> {
  const person = await db.row<PersonRow>(
    'select id, login, name, roles from work.people where id = :personId and active',
    {
      personId,
    },
  )
  return person && { kind: 'person', ...named(person), scopes: ['read', 'record'], sessionId }
}

const NOTED_EVERY_MS = 60_000

/** The person a token acts for, or null when the token is unknown, expired or ended. */
export async function tokenActor(db: Database, clock: Clock, secret: string): Promise<Actor | null> {
  const now = clock.now()
  const found = await db.row<PersonRow & { token_id: string; scopes: Scope[]; last_used_at: Date | null }>(
    `select p.id, p.login, p.name, p.roles, t.id as token_id, t.scopes, t.last_used_at
       from work.tokens t join work.people p on p.id = t.person_id
      where t.secret_sha256 = :digest and t.revoked_at is null and t.expires_at > :now and p.active`,
    { digest: tokenDigest(secret), now },
  )
  if (!found) return null
  if (!found.last_used_at || now.getTime() - found.last_used_at.getTime() > NOTED_EVERY_MS)
    await db.run('update work.tokens set last_used_at = :now where id = :id', { now, id: found.token_id })
  return { kind: 'token', ...named(found), scopes: found.scopes, tokenId: found.token_id }
}

/** What is kept of a token's secret: SHA-256 in hex (the secret itself holds 256 bits of chance). */
export function tokenDigest(secret: string): string {
  return createHash('sha256').update(secret).digest('hex')
}

function named({ id, login, name, roles }: PersonRow) {
  return { personId: id, login, name, roles }
}

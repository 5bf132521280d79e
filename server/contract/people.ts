import { z } from 'zod'
import { endpoint } from './endpoint.ts'
import { byId, idSchema, listOf, roleSchema, timeSchema } from './common.ts'

export const keyStatuses = ['none', 'awaiting-endorsement', 'active', 'locked', 'expired', 'revoked'] as const
export const keyStatusSchema = z.enum(keyStatuses)
export type KeyStatus = z.infer<typeof keyStatusSchema>

export const personSchema = z.object({
  id: idSchema,
  login: z.string(),
  name: z.string(),
  roles: z.array(roleSchema),
  signingKey: keyStatusSchema,
  active: z.boolean(),
})
export type Person = z.infer<typeof personSchema>

export const laboratorySchema = z.object({
  id: idSchema,
  name: z.string(),
  demo: z.boolean(),
  zone: z.string(),
})

export const sessionSchema = z.object({
  person: personSchema,
  roles: z.array(roleSchema),
  laboratory: laboratorySchema,
  /** When the session ends whatever happens (12 h), and when it ends without input (30 min). */
  endsAt: timeSchema,
  idleEndsAt: timeSchema,
  /** Number of entries that wait for this person as witness. */
  waiting: z.number().int(),
})
export type Session = z.infer<typeof sessionSchema>

/** What the sign-in page shows before anyone is known. */
export const welcomeSchema = z.object({
  laboratory: z.object({ name: z.string(), demo: z.boolean() }),
  demo: z
    .object({
      people: z.array(z.object({ login: z.string(), name: z.string(), role: roleSchema })),
      passphrase: z.string(),
    })
    .nullable(),
})

export const tokenSchema = z.object({
  id: idSchema,
  name: z.string(),
  scopes: z.array(z.enum(['read', 'record'])),
  createdAt: timeSchema,
  lastUsedAt: timeSchema.nullable(),
  expiresAt: timeSchema,
})

export const peopleEndpoints = {
  getWelcome: endpoint({
    method: 'GET',
    path: '/welcome',
    summary: 'Name of the laboratory and, in a demonstration, its people',
    tag: 'Session',
    access: 'anyone',
    token: 'never',
    reply: welcomeSchema,
  }),
  getSession: endpoint({
    method: 'GET',
    path: '/session',
    summary: 'Who am I',
    tag: 'Session',
    token: 'read',
    reply: sessionSchema,
  }),
  endSession: endpoint({
    method: 'DELETE',
    path: '/session',
    summary: 'Sign out',
    tag: 'Session',
    reply: null,
    status: 204,
  }),
  listPeople: endpoint({
    method: 'GET',
    path: '/people',
    summary: 'People of the laboratory',
    tag: 'People',
    reply: listOf(personSchema),
  }),
  listTokens: endpoint({
    method: 'GET',
    path: '/tokens',
    summary: 'My tokens',
    tag: 'Tokens',
    token: 'never',
    reply: listOf(tokenSchema),
  }),
  createToken: endpoint({
    method: 'POST',
    path: '/tokens',
    summary: 'A token for a script; its secret is shown once',
    tag: 'Tokens',
    body: z.strictObject({
      name: z.string().trim().min(1).max(80),
      scopes: z.array(z.enum(['read', 'record'])).min(1),
      days: z.number().int().min(1).max(366).default(90),
    }),
    reply: tokenSchema.extend({ secret: z.string() }),
    status: 201,
  }),
  revokeToken: endpoint({
    method: 'DELETE',
    path: '/tokens/:id',
    summary: 'End a token',
    tag: 'Tokens',
    params: byId,
    reply: null,
    status: 204,
  }),
}

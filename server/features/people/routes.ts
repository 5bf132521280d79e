import { randomBytes, randomUUID } from 'node:crypto'
import { endpoints } from '../../contract/endpoints.ts'
import type { Person } from '../../contract/people.ts'
import { Problem } from '../../contract/problems.ts'
import { tokenDigest, type Actor } from '../../platform/http/actor.ts'
import { answer, route, type Route } from '../../platform/http/route.ts'
import { demoAccounts, demoPassphrase } from '../../platform/identity/demo-accounts.ts'
import { endSession, sessionEnds } from '../../platform/identity/session.ts'
import type { Services } from '../../platform/services.ts'
import { laboratory } from '../laboratory/index.ts'
import { actorOf, appendEvent } from '../ledger/index.ts'
import { listPeople, type PersonRow } from './repository.ts'
import { endToken, insertToken, tokensOf } from './token-repository.ts'

/** What people's routes ask of features above them. */
export interface Neighbours {
  keyStatuses(personIds: readonly string[]): Promise<Map<string, Person['signingKey']>>
  waitingCount(personId: string): Promise<number>
}

const DAY_MS = 86_400_000

/** Session, people and personal tokens. */
export function peopleRoutes(services: Services, { keyStatuses, waitingCount }: Neighbours): Route[] {
  async function present(people: readonly PersonRow[]): Promise<Person[]> {
    const statuses = await keyStatuses(people.map((person) => person.id))
    return people.map(({ id, login, name, roles, active }) => ({
      id,
      login,
      name,
      roles,
      signingKey: statuses.get(id) ?? 'none',
      active,
    }))
  }

  async function me(actor: Actor): Promise<Person> {
    const [person] = await present([
      {
        id: actor.personId,
        login: actor.login,
        name: actor.name,
        email: null,
        roles: actor.roles,
        active: true,
      },
    ])
    return person as Person
  }

  return [
    route(endpoints.getWelcome, async () => {
      const { name, demo } = await laboratory(services)
      const people = demoAccounts.map(({ login, name: person, role }) => ({ login, name: person, role }))
      return {
        laboratory: { name, demo },
        demo: demo && services.config.demo ? { people, passphrase: demoPassphrase } : null,
      }
    }),
    route(endpoints.getSession, async ({ actor, req }) => {
      const person = await me(actor)
      const { id, name, demo, zone } = await laboratory(services)
      const ends = sessionEnds(req) ?? {
        endsAt: new Date(services.clock.now().getTime() + DAY_MS),
        idleEndsAt: new Date(services.clock.now().getTime() + DAY_MS),
      }
      return {
        person,
        roles: actor.roles,
        laboratory: { id, name, demo, zone },
        endsAt: ends.endsAt.toISOString(),
        idleEndsAt: ends.idleEndsAt.toISOString(),
        waiting: await waitingCount(actor.personId),
      }
    }),
    route(endpoints.endSession, async ({ actor, req, res }) => {
      await services.db.transaction((t) =>
        appendEvent(services, t, {
          actor: actorOf(actor),
          action: 'person.signed-out',
          subject: { kind: 'person', id: actor.personId },
          payload: {},
        }),
      )
      await endSession(req, res, services.config)
      return undefined
    }),
    route(endpoints.listPeople, async () => ({
      items: await present(await listPeople(services.db)),
      nextCursor: null,
    })),
    route(endpoints.listTokens, async ({ actor }) => ({
      items: await tokensOf(services.db, actor.personId),
      nextCursor: null,
    })),
    route(endpoints.createToken, async ({ actor, body }) => {
      const secret = `hs_${randomBytes(32).toString('base64url')}`
      const now = services.clock.now()
      const token = {
        id: randomUUID(),
        name: body.name,
        scopes: body.scopes,
        createdAt: now,
        expiresAt: new Date(now.getTime() + body.days * DAY_MS),
      }
      await services.db.transaction(async (t) => {
        await insertToken(
          services.db,
          { ...token, personId: actor.personId, secretSha256: tokenDigest(secret) },
          t,
        )
        await appendEvent(services, t, {
          actor: actorOf(actor),
          action: 'token.created',
          subject: { kind: 'person', id: actor.personId },
          payload: { tokenId: token.id, scopes: token.scopes },
        })
      })
      return answer(
        {
          ...token,
          createdAt: token.createdAt.toISOString(),
          expiresAt: token.expiresAt.toISOString(),
          lastUsedAt: null,
          secret,
        },
        { status: 201 },
      )
    }),
    route(endpoints.revokeToken, async ({ actor, params }) => {
      await services.db.transaction(async (t) => {
        if (!(await endToken(services.db, params.id, actor.personId, services.clock.now(), t)))
          throw new Problem('not-found', 'You have no such token.')
        await appendEvent(services, t, {
          actor: actorOf(actor),
          action: 'token.ended',
          subject: { kind: 'person', id: actor.personId },
          payload: { tokenId: params.id },
        })
      })
      return undefined
    }),
  ]
}

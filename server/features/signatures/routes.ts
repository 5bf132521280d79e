import { endpoints } from '../../contract/endpoints.ts'
import { answer, route, type Route } from '../../platform/http/route.ts'
import type { Services } from '../../platform/services.ts'
import { entrySignatures } from './present.ts'
import { createAddendum } from './use-cases/create-addendum.ts'
import { prepareRecord } from './use-cases/prepare-record.ts'
import { returnEntry, withdrawEntry } from './use-cases/return-entry.ts'
import { signEntry } from './use-cases/sign-entry.ts'

/** Preparing and giving signatures, and what else moves the state of an entry. */
export function signatureRoutes(services: Services): Route[] {
  return [
    route(endpoints.getSigningRecord, async ({ actor, params, query, res }) => {
      const { bytes, sha256 } = await prepareRecord(services, actor, params.id, query)
      res
        .status(200)
        .set({
          'Content-Type': 'application/json',
          'Content-Length': String(bytes.length),
          'Repr-Digest': `sha-256=:${Buffer.from(sha256, 'hex').toString('base64')}:`,
          ETag: `"${sha256}"`,
          'Cache-Control': 'no-store, no-transform',
        })
        .end(bytes)
      return undefined
    }),
    route(endpoints.signEntry, async ({ actor, params, body }) => {
      const { meaning, recordSha256 } = body
      const signature = Buffer.from(body.signature, 'base64')
      const id = await signEntry(services, actor, params.id, { meaning, recordSha256, signature })
      const given = (await entrySignatures(services, [params.id])).find((item) => item.id === id)
      if (!given) throw new Error('The signature just given is not there.')
      return answer(given, { status: 201 })
    }),
    route(endpoints.returnEntry, ({ actor, params, body }) =>
      returnEntry(services, actor, params.id, body.reason),
    ),
    route(endpoints.withdrawEntry, ({ actor, params, body }) =>
      withdrawEntry(services, actor, params.id, body.reason),
    ),
    route(endpoints.createAddendum, async ({ actor, params, body }) => {
      const made = await createAddendum(services, actor, params.id, body.title)
      return answer(made, { status: 201, headers: { location: `/api/v1/entries/${made.id}` } })
    }),
  ]
}

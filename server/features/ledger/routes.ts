import { endpoints } from '../../contract/endpoints.ts'
import { Problem } from '../../contract/problems.ts'
import { toHex } from '../../ledger-format/digest.ts'
import { route, type Route } from '../../platform/http/route.ts'
import type { Services } from '../../platform/services.ts'
import { anchors, findHead } from './heads.ts'
import { listEvents } from './list-events.ts'
import { merkleTree } from './read-events.ts'
import { verifyLedger } from './verify-ledger.ts'

const noHead =
  'There is no such signed head. The first is made when the first manager has enrolled a key and an entry is sealed.'

/** Events, heads and proofs of the ledger, and its full check. */
export function ledgerRoutes(services: Services): Route[] {
  return [
    route(endpoints.listEvents, async ({ actor, query }) => {
      const { limit, action, subject } = query
      const before = query.cursor === undefined ? Number.MAX_SAFE_INTEGER : Number(query.cursor)
      if (!Number.isSafeInteger(before))
        throw new Problem('invalid-values', 'The cursor is not one of this list.')
      const items = await listEvents(services, actor, { limit: limit + 1, before, action, subject })
      const page = items.slice(0, limit)
      return { items: page, nextCursor: items.length > limit ? String(page.at(-1)?.sequence) : null }
    }),
    route(endpoints.getHead, async ({ query }) => {
      const found = await findHead(services, query.treeSize)
      if (!found) throw new Problem('not-found', noHead)
      return {
        head: found.head,
        signature: found.signature.toString('base64'),
        timeStamp: found.timeStamp?.toString('base64') ?? null,
      }
    }),
    route(endpoints.getAnchors, async () => {
      const found = await anchors(services)
      if (!found)
        throw new Problem(
          'not-found',
          'The laboratory has no anchors until its first manager has enrolled a key.',
        )
      return found
    }),
    route(endpoints.getConsistency, async ({ query: { from, to } }) => {
      const tree = await merkleTree(services)
      if (from > to || to > tree.size)
        throw new Problem('invalid-values', `Give two sizes in order, up to ${tree.size}.`, {
          errors: [{ pointer: '/to', detail: `The ledger has ${tree.size} events.` }],
        })
      return { from, to, path: tree.consistencyPath(from, to).map(toHex) }
    }),
    route(endpoints.getInclusionProof, async ({ params: { seq }, query }) => {
      const tree = await merkleTree(services)
      const newest = (await findHead(services))?.head.treeSize ?? tree.size
      const treeSize = query.treeSize ?? (newest >= seq ? newest : tree.size)
      if (seq > treeSize || treeSize > tree.size)
        throw new Problem('not-found', `The tree of ${treeSize} events has no event ${seq}.`)
      return {
        sequence: seq,
        leafHash: toHex(tree.leaf(seq - 1)),
        treeSize,
        rootHash: toHex(tree.root(treeSize)),
        path: tree.inclusionPath(seq - 1, treeSize).map(toHex),
      }
    }),
    route(endpoints.verifyLedger, ({ body }) => verifyLedger(services, body.head)),
  ]
}

import { endpoints } from '../../contract/endpoints.ts'
import { Problem } from '../../contract/problems.ts'
import type { SigningKey } from '../../contract/signatures.ts'
import { answer, route, type Route } from '../../platform/http/route.ts'
import type { Services } from '../../platform/services.ts'
import { currentKey, keysOf, keyStatus } from './repository.ts'
import { enrolKey } from './use-cases/enrol-key.ts'
import { endorseKey, prepareEndorsement } from './use-cases/endorse-key.ts'
import { prepareEnrolment } from './use-cases/prepare-enrolment.ts'
import { unlockKey } from './use-cases/unlock-key.ts'

const noStore = { headers: { 'cache-control': 'no-store' } }
const bytes = (base64: string) => Buffer.from(base64, 'base64')

/** Enrolment, unlocking and endorsement of signing keys. */
export function keyRoutes(services: Services): Route[] {
  return [
    route(endpoints.getSigningKey, async ({ actor }) =>
      answer(await presentKey(services, actor.personId), noStore),
    ),
    route(endpoints.prepareEnrolment, async ({ actor, body }) => {
      const prepared = await prepareEnrolment(services, actor.personId, bytes(body.publicKey))
      return answer(prepared, { status: 201, ...noStore })
    }),
    route(endpoints.putSigningKey, async ({ actor, body }) => {
      const { enrolmentId, kdf, proofSha256 } = body
      await enrolKey(services, actor.personId, {
        enrolmentId,
        kdf,
        proofSha256,
        signature: bytes(body.signature),
        wrappedKey: bytes(body.wrappedKey),
        iv: bytes(body.iv),
      })
      return answer(await presentKey(services, actor.personId), noStore)
    }),
    route(endpoints.unlockSigningKey, async ({ actor, body, res }) => {
      res.set(noStore.headers)
      return answer(await unlockKey(services, actor.personId, bytes(body.proof)), noStore)
    }),
    route(endpoints.getEnrolment, async ({ params }) => {
      const [key] = await keysOf(services.db, [params.id])
      if (!key) throw new Problem('not-found', 'This person has enrolled no signing key.')
      return {
        document: key.document.toString('base64'),
        signature: key.signature.toString('base64'),
        enrolmentSha256: key.enrolmentSha256,
        status: keyStatus(key, services.clock.now()),
      }
    }),
    route(endpoints.prepareEndorsement, async ({ actor, params, body }) =>
      answer(await prepareEndorsement(services, actor.personId, params.id, body), { status: 201 }),
    ),
    route(endpoints.putEndorsement, async ({ actor, params, body }) => {
      const { endorsementId } = params
      await endorseKey(services, actor.personId, params.id, {
        endorsementId,
        signature: bytes(body.signature),
      })
      return { status: (await presentKey(services, params.id)).status }
    }),
  ]
}

async function presentKey(services: Services, personId: string): Promise<SigningKey> {
  const now = services.clock.now()
  const key = currentKey(await keysOf(services.db, [personId]), now)
  if (!key)
    return {
      status: 'none',
      publicKey: null,
      certificate: null,
      kdf: null,
      enrolmentSha256: null,
      lockedUntil: null,
      expiresAt: null,
    }
  const status = keyStatus(key, now)
  return {
    status,
    publicKey: key.publicKey.toString('base64'),
    certificate: key.certificate,
    kdf: key.kdf,
    enrolmentSha256: key.enrolmentSha256,
    lockedUntil: status === 'locked' ? (key.lockedUntil?.toISOString() ?? null) : null,
    expiresAt: key.notAfter?.toISOString() ?? null,
  }
}

import type { Transaction } from '../../platform/db/database.ts'
import type { Services } from '../../platform/services.ts'
import { currentKey, keysOf, keyStatus, type KeyRow, type KeyStatus } from './repository.ts'

/** State of the signing key of each person; a person without a key has `none`. */
export async function signingKeyStatuses(
  services: Pick<Services, 'db' | 'clock'>,
  personIds: readonly string[],
): Promise<Map<string, KeyStatus>> {
  const now = services.clock.now()
  const keys = await keysOf(services.db, personIds)
  return new Map(
    personIds.map((id) => {
      const key = currentKey(
        keys.filter(({ personId }) => personId === id),
        now,
      )
      return [id, key ? keyStatus(key, now) : 'none']
    }),
  )
}

/** A key that may sign now, its certificate present; locked ones too, since they lock the passphrase, not the key. */
export type CertifiedKey = KeyRow & { certificate: string; certificateSha256: string; notAfter: Date }

/** The person's key in force, or why there is none. */
export async function keyInForce(
  services: Pick<Services, 'db' | 'clock'>,
  personId: string,
  t?: Transaction,
): Promise<{ key: CertifiedKey } | { key: null; status: KeyStatus }> {
  const now = services.clock.now()
  const key = currentKey(await keysOf(services.db, [personId], t), now)
  const status = key ? keyStatus(key, now) : 'none'
  return key && (status === 'active' || status === 'locked')
    ? { key: key as CertifiedKey }
    : { key: null, status }
}

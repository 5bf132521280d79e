import { createHash, timingSafeEqual } from 'node:crypto'
import { Problem } from '../../../contract/problems.ts'
import type { Transaction } from '../../../platform/db/database.ts'
import type { Services } from '../../../platform/services.ts'
import { openAtRest } from '../../laboratory/index.ts'
import { appendEvent } from '../../ledger/index.ts'
import { allowedFailures, lockMinutes, minutesAfter } from '../policy.ts'
import {
  currentKey,
  keysOf,
  keyStatus,
  lockPerson,
  lockSigningKey,
  managerAddresses,
  setFailures,
  type PersonToSign,
} from '../repository.ts'

type Outcome = { wrappedKey: string; iv: string } | Problem

/**
 * Gives the wrapped key against the proof of the passphrase. Guesses are counted under the key's row lock; five wrong ones
 * lock signing for a quarter of an hour and are told by mail. Every try is an event of the person.
 */
export async function unlockKey(
  services: Services,
  personId: string,
  proof: Buffer,
): Promise<{ wrappedKey: string; iv: string }> {
  // A refusal must be committed (it counts), so it leaves the transaction as a value and is thrown after it.
  const outcome = await services.db.transaction((t) => tryProof(services, personId, proof, t))
  if (outcome instanceof Problem) throw outcome
  return outcome
}

async function tryProof(
  services: Services,
  personId: string,
  proof: Buffer,
  t: Transaction,
): Promise<Outcome> {
  const person = await lockPerson(services.db, personId, t)
  if (!person) return new Problem('not-allowed', 'Your account is not active.')
  const now = services.clock.now()
  const key = currentKey(await keysOf(services.db, [personId], t), now)
  const status = key ? keyStatus(key, now) : 'none'
  if (!key || (status !== 'active' && status !== 'locked'))
    return new Problem('key-not-active', inactiveSentence(status))
  const stored = await lockSigningKey(services.db, key.enrolmentId, t)
  if (!stored) return new Problem('key-not-active', inactiveSentence('none'))
  if (stored.lockedUntil && stored.lockedUntil > now) return lockedProblem(stored.lockedUntil, now)

  const open = (purpose: string, sealed: Buffer) =>
    openAtRest(services.config.secret, `${purpose} ${key.enrolmentId}`, sealed)
  const right = timingSafeEqual(
    createHash('sha256').update(proof).digest(),
    open('proof', stored.proofDigest),
  )
  if (!right) return refuse(services, person, key.enrolmentId, stored.failures + 1, t)
  await setFailures(services.db, key.enrolmentId, { failures: 0, lockedUntil: null }, t)
  await note(services, personId, 'signing.unlocked', {}, t)
  return {
    wrappedKey: open('signing key', stored.wrappedKey).toString('base64'),
    iv: stored.iv.toString('base64'),
  }
}

async function refuse(
  services: Services,
  person: PersonToSign,
  enrolmentId: string,
  failures: number,
  t: Transaction,
) {
  const attemptsLeft = Math.max(0, allowedFailures - failures)
  const lockedUntil = attemptsLeft === 0 ? minutesAfter(services.clock.now(), lockMinutes) : null
  await setFailures(services.db, enrolmentId, { failures: lockedUntil ? 0 : failures, lockedUntil }, t)
  if (lockedUntil) await tellOfLock(services, person, lockedUntil, t)
  await note(services, person.id, 'signing.refused', { reason: 'wrong-passphrase', attemptsLeft }, t)
  if (lockedUntil) await note(services, person.id, 'signing.locked', { until: lockedUntil.toISOString() }, t)
  const after = lockedUntil
    ? `Signing is locked until ${lockedUntil.toISOString()}.`
    : `${attemptsLeft} more attempts before signing is locked for ${lockMinutes} minutes.`
  return new Problem(
    'wrong-passphrase',
    `The passphrase is not the one of your signing key. Nothing was signed. ${after}`,
    {
      extra: { attemptsLeft, ...(lockedUntil ? { until: lockedUntil.toISOString() } : {}) },
    },
  )
}

function lockedProblem(until: Date, now: Date): Problem {
  return new Problem(
    'signing-locked',
    `Signing is locked until ${until.toISOString()} after ${allowedFailures} wrong passphrases. Nothing was signed; what you wrote is safe.`,
    {
      extra: { until: until.toISOString(), retryAfterS: (until.getTime() - now.getTime()) / 1000 },
    },
  )
}

export function inactiveSentence(status: string): string {
  const sentences: Record<string, string> = {
    none: 'You have no signing key yet. Enrol one first.',
    'awaiting-endorsement': 'Your signing key waits until a manager or supervisor has endorsed it.',
    expired: 'The certificate of your signing key has expired. Enrol a new key.',
    revoked: 'Your signing key was revoked. Enrol a new key.',
  }
  return sentences[status] ?? 'Your signing key cannot be used now.'
}

/** Acts on one's own key stay in the person's chain, so that they never reach a bundle. */
async function note(
  services: Services,
  personId: string,
  action: string,
  payload: Record<string, string | number>,
  t: Transaction,
) {
  await appendEvent(services, t, {
    actor: { kind: 'person', id: personId, onBehalfOf: null },
    action,
    subject: { kind: 'person', id: personId },
    payload,
  })
}

async function tellOfLock(
  services: Services,
  person: PersonToSign,
  until: Date,
  t: Transaction,
): Promise<void> {
  const addresses = new Set([
    ...(person.email ? [person.email] : []),
    ...(await managerAddresses(services.db, t)),
  ])
  for (const to of addresses) {
    const text =
      `Signing was locked for ${person.name} until ${until.toISOString()} after ${allowedFailures} wrong passphrases in a session of theirs.\n\n` +
      `If it was not ${person.name}, end their sessions and look at the sign-ins in the ledger.\n`
    await services.mail.enqueue({ to, subject: `Signing is locked for ${person.name}`, text }, t)
  }
}

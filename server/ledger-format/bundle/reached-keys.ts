import { parseJson } from '../canonical-json.ts'
import { sha256Hex } from '../digest.ts'
import type { Endorsement } from '../endorsement.ts'
import type { Enrolment } from '../enrolment.ts'
import type { KeyInput } from './bundle-input.ts'

/** A key with its documents read. */
export interface ReachedKey {
  input: KeyInput
  enrolment: Enrolment
  enrolmentSha256: string
  endorsement: Endorsement | null
}

/**
 * The keys of the signers, of their endorsers, and so on up to the root; the root's always. In order of enrolmentSha256.
 * Also what `chains` of entry.rendered lists.
 * @throws when a key that is led to is not among those given.
 */
export function reachedKeys(
  signers: Iterable<string>,
  keys: readonly KeyInput[],
  rootEnrolmentSha256: string,
): ReachedKey[] {
  const known = new Map(keys.map(readKey).map((key) => [key.enrolmentSha256, key]))
  const reached = new Map<string, ReachedKey>()
  const toVisit = [...signers, rootEnrolmentSha256]
  for (let digest = toVisit.pop(); digest !== undefined; digest = toVisit.pop()) {
    if (reached.has(digest)) continue
    const key = known.get(digest)
    if (!key) throw new Error(`The enrolment ${digest} is needed, but was not given.`)
    reached.set(digest, key)
    if (key.endorsement) toVisit.push(key.endorsement.endorser.enrolmentSha256)
  }
  return [...reached.values()].sort((a, b) => (a.enrolmentSha256 < b.enrolmentSha256 ? -1 : 1))
}

function readKey(input: KeyInput): ReachedKey {
  return {
    input,
    enrolment: parseJson(input.enrolment) as unknown as Enrolment,
    enrolmentSha256: sha256Hex(input.enrolment),
    endorsement: input.endorsement && (parseJson(input.endorsement.document) as unknown as Endorsement),
  }
}

import type { LedgerEventView } from '../../../server/contract/ledger.ts'
import { canonicalBytes } from '../../../server/ledger-format/canonical-json.ts'
import { fromHex } from '../../../server/ledger-format/digest.ts'
import { describeEvent, type LedgerEvent } from '../../../server/ledger-format/event.ts'
import { verifyInclusion } from '../../../server/ledger-format/merkle.ts'

export interface InclusionProof {
  leafHash: string
  treeSize: number
  rootHash: string
  path: string[]
}

export interface EventCheck {
  /** SHA-256 of the event as shown is the digest given beside it. */
  digest: boolean
  /** The proof leads from this event to the root hash of the head. */
  inclusion: boolean
}

/** The members of an event that are hashed (shapes 3), without what the interface adds. */
function eventOf(view: LedgerEventView): LedgerEvent {
  const {
    schema,
    epoch,
    sequence,
    time,
    actor,
    action,
    subject,
    subjectSequence,
    subjectPrevious,
    payload,
    previous,
  } = view
  return {
    schema,
    epoch,
    sequence,
    time,
    actor,
    action,
    subject: subject as LedgerEvent['subject'],
    subjectSequence,
    subjectPrevious,
    payload: payload as LedgerEvent['payload'],
    previous,
  }
}

/**
 * Checks an event here, not on the server: its digest and leaf hash are recomputed from what is shown, and the proof must
 * lead to the head's root hash.
 */
export function checkEventHere(
  view: LedgerEventView,
  proof: InclusionProof,
  head: { treeSize: number; rootHash: string },
): EventCheck {
  const event = eventOf(view)
  const built = describeEvent(event, canonicalBytes(event))
  const sameTree = proof.treeSize === head.treeSize && proof.rootHash === head.rootHash
  return {
    digest: built.digest === view.digest && built.leafHash === view.leafHash,
    inclusion:
      sameTree &&
      verifyInclusion(
        fromHex(built.leafHash),
        view.sequence - 1,
        head.treeSize,
        proof.path.map(fromHex),
        fromHex(head.rootHash),
      ),
  }
}

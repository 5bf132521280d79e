import { canonicalBytes } from '../canonical-json.ts'
import { toHex } from '../digest.ts'
import type { LedgerEvent } from '../event.ts'
import { leafHash, type MerkleTree } from '../merkle.ts'
import { byKeys } from '../record-order.ts'
import { concatBytes } from '@noble/hashes/utils.js'
import type { Proofs } from './description.ts'

const newline = Uint8Array.of(10)

export interface LedgerPart {
  /** events.jsonl */
  events: Uint8Array
  /** proofs.json */
  proofs: Uint8Array
}

/**
 * events.jsonl and proofs.json of one folder: the events up to the tree size by sequence, and one inclusion proof for each of
 * them and for each sequence of `bounds` (`signing.ledger` of the records there).
 * @throws when an event is not the leaf that the tree has.
 */
export function ledgerPart(
  events: readonly LedgerEvent[],
  bounds: readonly number[],
  tree: MerkleTree,
  treeSize: number,
): LedgerPart {
  const chosen = events.filter((event) => event.sequence <= treeSize).sort(byKeys((event) => event.sequence))
  const lines = chosen.map((event) => canonicalBytes(event))
  chosen.forEach((event, i) => {
    const leaf = leafHash(lines[i] ?? new Uint8Array())
    if (toHex(leaf) !== toHex(tree.leaf(event.sequence - 1)))
      throw new Error(`Event ${event.sequence} is not the ledger's.`)
  })
  const sequences = [...new Set([...chosen.map((event) => event.sequence), ...bounds])].sort((a, b) => a - b)
  const proofs: Proofs = sequences.map((sequence) => ({
    sequence,
    leafHash: toHex(tree.leaf(sequence - 1)),
    path: tree.inclusionPath(sequence - 1, treeSize).map(toHex),
  }))
  return { events: concatBytes(...lines.flatMap((line) => [line, newline])), proofs: canonicalBytes(proofs) }
}

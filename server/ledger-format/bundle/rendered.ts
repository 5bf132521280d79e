import { sha256Hex } from '../digest.ts'
import type { PayloadOf } from '../event-payloads.ts'

type Rendered = PayloadOf<'entry.rendered'>

/**
 * Payload of entry.rendered: digests of entry.pdf, entry.html and each result file (name = path in the entry's folder, sorted),
 * and where the chains of each key in keys/ (`reachedKeys`) and of the amended entry end now.
 */
export function renderedPayload(
  files: readonly { name: string; bytes: Uint8Array }[],
  chains: Rendered['chains'],
): Rendered {
  return {
    files: files
      .map(({ name, bytes }) => ({ name, sha256: sha256Hex(bytes) }))
      .sort((a, b) => (a.name < b.name ? -1 : 1)),
    chains: [...chains].sort((a, b) => (a.kind + a.id < b.kind + b.id ? -1 : 1)),
  }
}

import { canonicalBytes } from '../../ledger-format/canonical-json.ts'
import { sha256Hex } from '../../ledger-format/digest.ts'
import type { FileInput } from './repository.ts'

/** Names a computation by all it depends on; null while a reading is not known. */
export function cacheKey(of: {
  kind: string
  version: number
  engine: string
  parameters: Record<string, unknown>
  inputs: readonly FileInput[]
}): string | null {
  if (of.inputs.some((input) => input.readingSha256 === null)) return null
  const { kind, version, engine, parameters } = of
  const inputs = of.inputs.map(({ sha256, readingSha256 }) => ({ sha256, readingSha256 }))
  return sha256Hex(canonicalBytes({ kind, version, engine, parameters, inputs }))
}

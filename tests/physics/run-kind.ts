import type { TagRecord } from '../../server/contract/tag-record.ts'
import { kindDefinition, parseParameters } from '../../server/physics/registry.ts'

/** Runs a kind as the worker does: parse, compute, and the result through JSON as it is stored. */
export async function runKind<Result>(kind: string, parameters: unknown, ...records: TagRecord[]) {
  const definition = kindDefinition(kind)
  const { compute } = await definition.load()
  const { result, notes } = compute({
    parameters: parseParameters(definition, parameters),
    inputs: records.map((record) => ({ record })),
  })
  return {
    result: definition.result.parse(JSON.parse(JSON.stringify(result))) as Result,
    stored: JSON.stringify(result),
    codes: notes.map((note) => note.code),
    notes,
  }
}

/** A record from a list of [time in ps, channel]. */
export function recordOf(
  tags: [number | bigint, number][],
  declaredDurationPs: bigint | null = null,
): TagRecord {
  const sorted = tags
    .map(([t, c]) => [BigInt(t), c] as const)
    .sort((a, b) => (a[0] < b[0] ? -1 : a[0] > b[0] ? 1 : 0))
  return {
    times: BigInt64Array.from(sorted, ([t]) => t),
    channels: Uint16Array.from(sorted, ([, c]) => c),
    declaredDurationPs,
  }
}

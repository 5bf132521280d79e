import type { CalculationKind } from '../../../server/contract/calculations.ts'
import type { RawFile } from '../../../server/contract/files.ts'
import type { JsonSchema } from './json-schema.ts'

/** Bounds by which the schema of a parameter tells that it is a channel number. */
const lastChannel = 65535

/**
 * Parameters to begin with: the kind's own example, its channels replaced by those of the file, the most counted first.
 */
export function startParameters(kind: CalculationKind, file: RawFile | undefined): Record<string, unknown> {
  const example = kind.example as { parameters?: Record<string, unknown> }
  const parameters = structuredClone(example.parameters ?? (kind.example as Record<string, unknown>))
  const present = [...(file?.reading.channels ?? [])].sort((one, two) => two.counts - one.counts)
  const properties = (kind.parameters as JsonSchema).properties ?? {}
  const named = Object.keys(properties).filter(
    (key) => properties[key]?.maximum === lastChannel && key in parameters,
  )
  const inExample = [...new Set(named.map((key) => parameters[key]))]
  for (const key of named) {
    const channel = present[inExample.indexOf(parameters[key])]?.channel
    if (channel !== undefined) parameters[key] = channel
  }
  return parameters
}

import { z } from 'zod'
import { Problem } from '../contract/problems.ts'
import type { KindDefinition } from './definition.ts'
import { coincidences } from './kinds/coincidences/definition.ts'
import { correlation } from './kinds/correlation/definition.ts'
import { heralded } from './kinds/heralded/definition.ts'
import { pulsedCorrelation } from './kinds/pulsed-correlation/definition.ts'
import { singles } from './kinds/singles/definition.ts'

/** Every kind of calculation, in the order in which they are offered. */
export const kindDefinitions: readonly KindDefinition[] = [
  singles,
  coincidences,
  correlation,
  pulsedCorrelation,
  heralded,
]

/** The definition of a kind: of the newest version, or of the one that a signed record names. */
export function kindDefinition(kind: string, version?: number): KindDefinition {
  const versions = kindDefinitions.filter((d) => d.kind === kind)
  const found = version === undefined ? versions.at(-1) : versions.find((d) => d.version === version)
  if (found !== undefined) return found
  const detail =
    versions.length === 0
      ? `There is no calculation "${kind}". Known are ${[...new Set(kindDefinitions.map((d) => d.kind))].join(', ')}.`
      : `The calculation "${kind}" has no version ${version}.`
  throw new Problem('invalid-values', detail, { errors: [{ pointer: '/kind', detail }] })
}

/** Parameters with defaults filled in, as they are stored and signed; unknown or unfit ones are refused by name. */
export function parseParameters(definition: KindDefinition, parameters: unknown): Record<string, unknown> {
  const parsed = definition.parameters.safeParse(parameters)
  if (parsed.success) return parsed.data
  const errors = parsed.error.issues.flatMap((issue) => fieldErrors(issue))
  throw new Problem(
    'invalid-values',
    `The parameters of "${definition.kind}" do not fit: ${errors[0]!.detail}`,
    { errors },
  )
}

function fieldErrors(issue: z.core.$ZodIssue): { pointer: string; detail: string }[] {
  const pointer = `/parameters${issue.path.map((step) => `/${escaped(String(step))}`).join('')}`
  if (issue.code !== 'unrecognized_keys') return [{ pointer, detail: issue.message }]
  return issue.keys.map((key) => ({
    pointer: `${pointer}/${escaped(key)}`,
    detail: `There is no parameter "${key}".`,
  }))
}

/** A step of a JSON pointer (RFC 6901). */
const escaped = (step: string): string => step.replaceAll('~', '~0').replaceAll('/', '~1')

/** JSON Schema of the parameters as a caller gives them, with titles and units. */
export function parametersJsonSchema(definition: KindDefinition): Record<string, unknown> {
  return z.toJSONSchema(definition.parameters, { io: 'input' })
}

import { kindDefinition } from './registry.ts'

/** A figure that a result reports, with full digits; rounding is for whoever shows it. */
export interface ReportedFigure {
  pointer: string
  label: string
  value: number
  u: number | null
  unit: string
}

/** The figures of a result in the order of definitions.md, null values left out. */
export function figuresOf(kind: string, result: unknown, version?: number): ReportedFigure[] {
  return kindDefinition(kind, version)
    .figures(result)
    .flatMap(({ pointer, label }) => {
      const found = figureAt(result, pointer)
      return found === null ? [] : [{ pointer, label, ...found }]
    })
}

/** Value, u and unit at a JSON pointer: of a quantity, or of a bare number; null where there is none. */
export function figureAt(
  result: unknown,
  pointer: string,
): { value: number; u: number | null; unit: string } | null {
  const found = atPointer(result, pointer)
  if (typeof found === 'number') return { value: found, u: null, unit: '1' }
  if (typeof found !== 'object' || found === null) return null
  const { value, u, unit } = found as Record<string, unknown>
  if (typeof value !== 'number') return null
  return { value, u: typeof u === 'number' ? u : null, unit: typeof unit === 'string' ? unit : '1' }
}

/** What a JSON pointer names (RFC 6901); undefined where it leads nowhere. */
export function atPointer(document: unknown, pointer: string): unknown {
  if (pointer === '') return document
  let place = document
  for (const step of pointer.slice(1).split('/')) {
    const name = step.replaceAll('~1', '/').replaceAll('~0', '~')
    if (typeof place !== 'object' || place === null || !Object.hasOwn(place, name)) return undefined
    place = (place as Record<string, unknown>)[name]
  }
  return place
}

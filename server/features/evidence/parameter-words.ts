interface ParameterSchema {
  title?: string
  unit?: string
}

/** Parameters as a sentence: the words and units of the kind's own schema, values as signed. */
export function parameterWords(schema: Record<string, unknown>, parameters: Record<string, unknown>): string {
  const properties = (schema.properties ?? {}) as Record<string, ParameterSchema | undefined>
  const words = Object.entries(parameters)
    .filter(([, value]) => value !== null && value !== undefined)
    .map(([name, value]) => {
      const { title = name, unit } = properties[name] ?? {}
      return `${title} ${valueWords(value)}${unit === undefined || typeof value === 'object' ? '' : ` ${unit}`}`
    })
  return words.length > 0 ? `${words.join('; ')}.` : ''
}

/** Quantities as value ± u with unit, lists and groups in turn; numbers as they are in the record. */
function valueWords(value: unknown): string {
  if (Array.isArray(value)) return value.map(valueWords).join(', ')
  if (typeof value !== 'object' || value === null) return String(value)
  const group = value as Record<string, unknown>
  if ('value' in group) {
    const spread = typeof group.u === 'number' ? ` ± ${group.u}` : ''
    return `${String(group.value)}${spread}${typeof group.unit === 'string' ? ` ${group.unit}` : ''}`
  }
  return Object.entries(group)
    .filter(([, item]) => item !== null && item !== undefined)
    .map(([name, item]) => `${name} ${valueWords(item)}`)
    .join(', ')
}

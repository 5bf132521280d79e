interface ParameterSchema {
  title?: string
  unit?: string
  properties?: Record<string, ParameterSchema | undefined>
}

/** Parameters as a sentence: the words and units of the kind's own schema at every depth, values as signed. */
export function parameterWords(schema: Record<string, unknown>, parameters: Record<string, unknown>): string {
  const words = membersInWords(schema as ParameterSchema, parameters)
  return words.length > 0 ? `${words.join('; ')}.` : ''
}

function membersInWords({ properties = {} }: ParameterSchema, group: Record<string, unknown>): string[] {
  return Object.entries(group)
    .filter(([, value]) => value !== null && value !== undefined)
    .map(([name, value]) => {
      const member = properties[name] ?? {}
      return `${member.title ?? name} ${valueInWords(member, value)}`
    })
}

/** A quantity as value ± u with its unit, a list item by item, a group in brackets; numbers as they are in the record. */
function valueInWords(schema: ParameterSchema, value: unknown): string {
  if (Array.isArray(value)) return value.map((item) => valueInWords(schema, item)).join(', ')
  if (typeof value !== 'object' || value === null)
    return schema.unit === undefined ? String(value) : `${String(value)} ${schema.unit}`
  const group = value as Record<string, unknown>
  if (!('value' in group)) return `(${membersInWords(schema, group).join(', ')})`
  const spread = typeof group.u === 'number' ? ` ± ${group.u}` : ''
  return `${String(group.value)}${spread}${typeof group.unit === 'string' ? ` ${group.unit}` : ''}`
}

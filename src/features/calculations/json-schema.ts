/** The part of JSON Schema that parameters are written in (2020-12, as zod gives it). */
export interface JsonSchema {
  type?: string
  title?: string
  description?: string
  /** Our own annotation: the unit of the value. */
  unit?: string
  default?: unknown
  const?: unknown
  enum?: unknown[]
  anyOf?: JsonSchema[]
  oneOf?: JsonSchema[]
  properties?: Record<string, JsonSchema>
  required?: string[]
  additionalProperties?: JsonSchema | boolean
  items?: JsonSchema
  minimum?: number
  maximum?: number
  $ref?: string
  $defs?: Record<string, JsonSchema>
}

/** A schema without the alternative `null` and without reference; annotations of the outside win. */
export function plain(schema: JsonSchema, root: JsonSchema): JsonSchema {
  if (schema.$ref !== undefined) {
    const target = root.$defs?.[schema.$ref.split('/').pop() ?? ''] ?? {}
    return plain({ ...target, ...schema, $ref: undefined }, root)
  }
  const choices = schema.anyOf?.filter((each) => each.type !== 'null')
  if (choices?.length === 1) return plain({ ...choices[0], ...schema, anyOf: undefined }, root)
  return schema
}

/** The alternative of a union that a value is written in, else the first. */
export function alternativeFor(schema: JsonSchema, value: unknown, root: JsonSchema): JsonSchema {
  const options = (schema.anyOf ?? schema.oneOf ?? []).map((each) => plain(each, root))
  const isObject = typeof value === 'object' && value !== null
  const fits = options.find((option) =>
    isObject
      ? Object.keys(value).every((key) => option.properties && key in option.properties) &&
        Object.entries(option.properties ?? {}).every(
          ([key, each]) => each.const === undefined || (value as Record<string, unknown>)[key] === each.const,
        )
      : option.type === undefined || option.type === typeof value,
  )
  return { ...(fits ?? options[0]), title: schema.title, unit: schema.unit ?? fits?.unit }
}

/** A value to begin with: the default, the only or first possible one, else what is closest to nothing. */
export function startValue(given: JsonSchema, root: JsonSchema): unknown {
  const schema = plain(given, root)
  if (schema.default !== undefined) return schema.default
  if (schema.const !== undefined) return schema.const
  if (schema.enum) return schema.enum[0]
  if (schema.anyOf ?? schema.oneOf) return startValue((schema.anyOf ?? schema.oneOf)![0]!, root)
  if (schema.type === 'object') {
    const required = schema.required ?? []
    return Object.fromEntries(required.map((key) => [key, startValue(schema.properties?.[key] ?? {}, root)]))
  }
  if (schema.type === 'array') return []
  if (schema.type === 'boolean') return false
  if (schema.type === 'string') return ''
  return Math.max(schema.minimum ?? 0, 0)
}

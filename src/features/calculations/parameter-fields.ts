import { alternativeFor, plain, startValue, type JsonSchema } from './json-schema.ts'

export type Path = (string | number)[]

/** One value of the parameters that a person can change. */
export interface ParameterLeaf {
  path: Path
  label: string
  help: string | undefined
  unit: string | undefined
  form: 'time' | 'whole-time' | 'quantity' | 'number' | 'integer' | 'choice' | 'yes-no' | 'integers' | 'json'
  choices: string[]
  value: unknown
  /** Whether it can be left out. */
  optional: boolean
  /** Whether it is what the kind takes by itself. */
  usual: boolean
}

/** A parameter that is not given and can be added. */
export interface AbsentParameter {
  path: Path
  label: string
  help: string | undefined
  /** What adding it puts there; null for a map, whose key is asked for first. */
  start: unknown
  keyed: boolean
}

export interface ParameterForm {
  given: ParameterLeaf[]
  absent: AbsentParameter[]
}

/** Reads which fields a set of parameters has and which could be added, from the JSON Schema of the kind alone. */
export function parameterForm(schema: JsonSchema, parameters: Record<string, unknown>): ParameterForm {
  const form: ParameterForm = { given: [], absent: [] }
  readObject({ schema, value: parameters, path: [], suffix: '', optional: false }, form, schema)
  return form
}

interface Place {
  schema: JsonSchema
  value: unknown
  path: Path
  /** Put after the title, where titles repeat: the key of a map. */
  suffix: string
  optional: boolean
}

function readObject(place: Place, form: ParameterForm, root: JsonSchema): void {
  const required = new Set(place.schema.required ?? [])
  for (const [key, given] of Object.entries(place.schema.properties ?? {})) {
    const schema = plain(given, root)
    const path = [...place.path, key]
    const held = (place.value as Record<string, unknown>)[key]
    const value = held ?? (required.has(key) ? startValue(schema, root) : schema.default)
    if (value === undefined || value === null) {
      const label = (schema.title ?? key) + place.suffix
      form.absent.push({
        path,
        label,
        help: schema.description,
        start: startValue(schema, root),
        keyed: isMap(schema),
      })
    } else {
      const optional = !required.has(key) && schema.default === undefined
      readValue({ schema, value, path, suffix: place.suffix, optional }, form, root)
    }
  }
}

function readValue(place: Place, form: ParameterForm, root: JsonSchema): void {
  const { schema, value, path, suffix, optional } = place
  if (schema.const !== undefined) return
  const isUnion = (schema.anyOf ?? schema.oneOf) !== undefined
  const actual = isUnion && schema.unit !== 'ps' ? alternativeFor(schema, value, root) : schema
  if (isMap(actual)) return readMap({ ...place, schema: actual }, form, root)
  const quantity = isQuantity(actual)
  if (actual.properties && isRecord(value) && !quantity)
    return readObject({ ...place, schema: actual }, form, root)
  form.given.push({
    path,
    label: (schema.title ?? String(path.at(-1))) + suffix,
    help: schema.description,
    unit: schema.unit,
    form: quantity ? 'quantity' : formOf(actual),
    choices: (actual.enum ?? []).map(String),
    value,
    optional,
    usual: schema.default !== undefined && JSON.stringify(value) === JSON.stringify(schema.default),
  })
}

function readMap({ schema, value, path }: Place, form: ParameterForm, root: JsonSchema): void {
  const inner = plain(schema.additionalProperties as JsonSchema, root)
  for (const [key, each] of Object.entries(value as Record<string, unknown>)) {
    readValue(
      { schema: inner, value: each, path: [...path, key], suffix: ` ${key}`, optional: true },
      form,
      root,
    )
  }
  const label = schema.title ?? String(path.at(-1))
  form.absent.push({ path, label, help: schema.description, start: startValue(inner, root), keyed: true })
}

/** A value with its uncertainty is one field, not three. */
function isQuantity(schema: JsonSchema): boolean {
  return (
    Object.keys(schema.properties ?? {})
      .sort()
      .join() === 'u,unit,value'
  )
}

function isMap(schema: JsonSchema): boolean {
  return schema.properties === undefined && typeof schema.additionalProperties === 'object'
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value)
}

function formOf(schema: JsonSchema): ParameterLeaf['form'] {
  if (schema.enum) return 'choice'
  if (schema.unit === 'ps') return schema.type === 'number' ? 'time' : 'whole-time'
  if (schema.type === 'boolean') return 'yes-no'
  if (schema.type === 'integer') return 'integer'
  if (schema.type === 'number') return 'number'
  const items = schema.items?.type
  if (schema.type === 'array' && items === 'integer') return 'integers'
  return 'json'
}

/** The parameters with one value changed; with `undefined`, left out. The original stays as it is. */
export function withValue(
  parameters: Record<string, unknown>,
  path: Path,
  value: unknown,
): Record<string, unknown> {
  const [key, ...rest] = path
  if (key === undefined) return parameters
  const inner = parameters[key]
  const next = rest.length === 0 ? value : withValue(isRecord(inner) ? inner : {}, rest, value)
  const { [key]: _, ...others } = parameters
  if (next === undefined) return others
  // An existing key keeps its place.
  return key in parameters ? { ...parameters, [key]: next } : { ...others, [key]: next }
}

/** RFC 6901 pointer of a path under `/parameters`, as the server names a wrong value. */
export function pointerOf(path: Path): string {
  return ['/parameters', ...path.map((key) => String(key).replace(/~/g, '~0').replace(/\//g, '~1'))].join('/')
}

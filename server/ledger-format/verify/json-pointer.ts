import type { Json } from '../canonical-json.ts'
import { need, Wrong } from './report.ts'

/** Value at a JSON pointer (RFC 6901). @throws Wrong when the document has nothing there. */
export function atPointer(document: Json, pointer: string): Json {
  need(pointer === '' || pointer.startsWith('/'), `no JSON pointer: ${pointer}`)
  let value = document
  for (const part of pointer.split('/').slice(1)) {
    const name = part.replaceAll('~1', '/').replaceAll('~0', '~')
    const next = childOf(value, name)
    if (next === undefined) throw new Wrong(`the result has nothing at ${pointer}`)
    value = next
  }
  return value
}

function childOf(value: Json, name: string): Json | undefined {
  if (Array.isArray(value)) return /^(0|[1-9]\d*)$/.test(name) ? value[Number(name)] : undefined
  if (typeof value === 'object' && value !== null && Object.hasOwn(value, name)) return value[name]
  return undefined
}

/** As `atPointer`, null when there is nothing. */
export function atPointerOrNull(document: Json, pointer: string): Json {
  try {
    return atPointer(document, pointer)
  } catch {
    return null
  }
}

import canonicalize from 'canonicalize'
import { sameBytes } from './bytes.ts'
import { utf8Bytes, utf8Text } from './utf8.ts'

export type Json = null | boolean | number | string | Json[] | { [member: string]: Json }

/**
 * Bytes of the canonical form of a JSON value (RFC 8785): UTF-8, no blanks, members by UTF-16 code unit, ECMAScript
 * numbers, no newline. NaN, infinities, lone surrogates and BigInt are refused.
 */
export function canonicalBytes(value: unknown): Uint8Array {
  const text = canonicalize(value)
  if (text === undefined) throw new Error('Nothing to write: the value is undefined.')
  return utf8Bytes(text)
}

/**
 * Strict JSON (RFC 7493): UTF-8 without byte order mark, no member twice, finite numbers, no lone surrogates.
 * @throws Error that says what is wrong.
 */
export function parseJson(bytes: Uint8Array): Json {
  return parseWithForm(bytes).value
}

/** As `parseJson`, and the bytes must be the canonical form of their own content. */
export function parseCanonical(bytes: Uint8Array): Json {
  const { value, form } = parseWithForm(bytes)
  if (!sameBytes(form, bytes))
    throw new Error('Bytes are not the canonical form (RFC 8785) of their own content.')
  return value
}

function parseWithForm(bytes: Uint8Array): { value: Json; form: Uint8Array } {
  const text = utf8Text(bytes)
  const value = JSON.parse(text) as Json
  const twice = memberTwice(text)
  if (twice !== null) throw new Error(`The member ${JSON.stringify(twice)} stands twice in one object.`)
  return { value, form: canonicalBytes(value) }
}

const tokens = /"(?:[^"\\]|\\.)*"|[{}[\],]/g

/** First member name that occurs twice in an object of well-formed JSON text, else null. */
function memberTwice(text: string): string | null {
  const open: (Set<string> | null)[] = []
  let nameIsDue = false
  for (const [token] of text.matchAll(tokens)) {
    const names = open.at(-1)
    if (token === '{' || token === '[') open.push(token === '{' ? new Set() : null)
    else if (token === '}' || token === ']') open.pop()
    else if (token !== ',' && nameIsDue && names) {
      const name = JSON.parse(token) as string
      if (names.has(name)) return name
      names.add(name)
    }
    nameIsDue = token === '{' || (token === ',' && open.at(-1) !== null)
  }
  return null
}

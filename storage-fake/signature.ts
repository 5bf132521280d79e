import { createHash, createHmac } from 'node:crypto'
import { S3Error } from './errors.ts'

/**
 * Signature Version 4 as published in the "Authenticating Requests" chapter of the Amazon S3 API reference:
 * canonical request, string to sign, signing key. S3 does not normalise paths and encodes them once.
 */

/** One header line as it came, name and value. */
export type HeaderLine = [name: string, value: string]

export interface CanonicalInput {
  method: string
  /** Path as sent, still percent-encoded. */
  path: string
  /** Query as sent, without the question mark. */
  query: string
  headers: HeaderLine[]
  signedHeaders: string[]
  payloadHash: string
}

export interface Scope {
  /** yyyymmdd */
  day: string
  region: string
  service: string
}

/** Percent-decodes into UTF-8 text. Throws InvalidURI on a broken escape or bytes that are not UTF-8. */
export function decodePercent(text: string): string {
  try {
    return decodeURIComponent(text)
  } catch {
    throw new S3Error(
      'InvalidURI',
      'The request address holds a broken percent escape or bytes that are not UTF-8.',
    )
  }
}

/** UriEncode of the specification: everything but A-Z a-z 0-9 - . _ ~ becomes %XX in capitals. */
export function encodePercent(text: string): string {
  return encodeURIComponent(text).replace(/[!'()*]/g, (c) => `%${c.charCodeAt(0).toString(16).toUpperCase()}`)
}

/** Name and value pairs of a query string, decoded, in the order sent. */
export function parseQuery(query: string): [string, string][] {
  if (query === '') return []
  return query.split('&').map((part) => {
    const [name = '', ...rest] = part.split('=')
    const decode = (text: string) => decodePercent(text.replaceAll('+', ' '))
    return [decode(name), decode(rest.join('='))]
  })
}

const byBytes = (a: string, b: string) => (a < b ? -1 : a > b ? 1 : 0)

function canonicalQuery(query: string): string {
  return parseQuery(query)
    .filter(([name]) => name !== 'X-Amz-Signature')
    .map(([name, value]): [string, string] => [encodePercent(name), encodePercent(value)])
    .sort((a, b) => byBytes(a[0], b[0]) || byBytes(a[1], b[1]))
    .map(([name, value]) => `${name}=${value}`)
    .join('&')
}

function canonicalHeaders(headers: HeaderLine[], signedHeaders: string[]): string {
  return signedHeaders
    .map((name) => {
      const values = headers.filter(([given]) => given.toLowerCase() === name).map(([, value]) => value)
      return `${name}:${values.map((value) => value.trim().replace(/\s+/g, ' ')).join(',')}\n`
    })
    .join('')
}

/** The canonical request, as text. */
export function canonicalRequest(input: CanonicalInput): string {
  const path = input.path.split('/').map(decodePercent).map(encodePercent).join('/')
  return [
    input.method,
    path,
    canonicalQuery(input.query),
    canonicalHeaders(input.headers, input.signedHeaders),
    input.signedHeaders.join(';'),
    input.payloadHash,
  ].join('\n')
}

/** The string to sign for a canonical request at a time (yyyymmddThhmmssZ). */
export function stringToSign(canonical: string, timestamp: string, scope: Scope): string {
  const hash = createHash('sha256').update(canonical, 'utf8').digest('hex')
  return `AWS4-HMAC-SHA256\n${timestamp}\n${scope.day}/${scope.region}/${scope.service}/aws4_request\n${hash}`
}

/** The key derived from a secret for one day, region and service. */
export function signingKey(secretKey: string, scope: Scope): Buffer {
  const hmac = (key: string | Buffer, text: string) => createHmac('sha256', key).update(text, 'utf8').digest()
  const dayKey = hmac(`AWS4${secretKey}`, scope.day)
  return hmac(hmac(hmac(dayKey, scope.region), scope.service), 'aws4_request')
}

/** Hex signature of a string to sign. */
export function signature(toSign: string, secretKey: string, scope: Scope): string {
  return createHmac('sha256', signingKey(secretKey, scope)).update(toSign, 'utf8').digest('hex')
}

import { timingSafeEqual } from 'node:crypto'
import type { IncomingMessage } from 'node:http'
import { S3Error } from './errors.ts'
import {
  canonicalRequest,
  parseQuery,
  signature,
  stringToSign,
  type HeaderLine,
  type Scope,
} from './signature.ts'

/** Who may call, and where this server pretends to be. */
export interface Credentials {
  accessKey: string
  secretKey: string
  region: string
}

/** What a verified request says of its body: the hex SHA-256, or UNSIGNED-PAYLOAD. */
export type PayloadHash = string

interface Claim {
  accessKey: string
  scope: Scope
  timestamp: string
  signedHeaders: string[]
  signature: string
  payloadHash: PayloadHash
  /** Seconds a presigned address lives; null for a signature in the header. */
  expires: number | null
}

const algorithm = 'AWS4-HMAC-SHA256'
const skewMs = 15 * 60_000
const longestPresignSeconds = 7 * 24 * 3600

/** Header lines as they came: names and values in pairs. */
export function headerLines(request: IncomingMessage): HeaderLine[] {
  const raw = request.rawHeaders
  return raw.flatMap((name, i): HeaderLine[] => (i % 2 === 0 ? [[name, raw[i + 1]!]] : []))
}

function parseCredential(
  credential: string,
  code: 'AuthorizationHeaderMalformed' | 'AuthorizationQueryParametersError',
) {
  const parts = credential.split('/')
  const [day, region, service, end] = parts.slice(-4)
  if (parts.length < 5 || end !== 'aws4_request') {
    throw new S3Error(code, 'The credential must be <access key>/<yyyymmdd>/<region>/s3/aws4_request.')
  }
  return { accessKey: parts.slice(0, -4).join('/'), scope: { day: day!, region: region!, service: service! } }
}

function claimOfHeader(authorization: string, request: IncomingMessage): Claim {
  if (!authorization.startsWith(`${algorithm} `)) {
    throw new S3Error('InvalidRequest', `Only ${algorithm} signatures are accepted.`)
  }
  const fields = new Map(
    authorization
      .slice(algorithm.length)
      .split(',')
      .map((field): [string, string] => {
        const [name = '', ...value] = field.trim().split('=')
        return [name, value.join('=')]
      }),
  )
  const [credential, signedHeaders, given] = ['Credential', 'SignedHeaders', 'Signature'].map((n) =>
    fields.get(n),
  )
  if (!credential || !signedHeaders || !given) {
    throw new S3Error(
      'AuthorizationHeaderMalformed',
      'Credential, SignedHeaders and Signature must all be given.',
    )
  }
  const timestamp = request.headers['x-amz-date']
  if (typeof timestamp !== 'string')
    throw new S3Error('AccessDenied', 'A signed request needs the header x-amz-date.')
  return {
    ...parseCredential(credential, 'AuthorizationHeaderMalformed'),
    timestamp,
    signedHeaders: signedHeaders.split(';'),
    signature: given,
    payloadHash: payloadHashOf(request),
    expires: null,
  }
}

function payloadHashOf(request: IncomingMessage): PayloadHash {
  const hash = request.headers['x-amz-content-sha256']
  if (typeof hash !== 'string') {
    throw new S3Error('InvalidRequest', 'A signed request needs the header x-amz-content-sha256.')
  }
  if (hash.startsWith('STREAMING-')) {
    throw new S3Error(
      'NotImplemented',
      'Signatures in chunks are not implemented: sign the whole body or send UNSIGNED-PAYLOAD.',
    )
  }
  if (hash !== 'UNSIGNED-PAYLOAD' && !/^[0-9a-f]{64}$/.test(hash)) {
    throw new S3Error(
      'InvalidArgument',
      'x-amz-content-sha256 must be UNSIGNED-PAYLOAD or 64 hexadecimal digits.',
    )
  }
  return hash
}

function claimOfQuery(query: Map<string, string>): Claim {
  const need = (name: string) => {
    const value = query.get(name)
    if (value) return value
    throw new S3Error('AuthorizationQueryParametersError', `A presigned address needs ${name}.`)
  }
  if (need('X-Amz-Algorithm') !== algorithm) {
    throw new S3Error('AuthorizationQueryParametersError', `Only ${algorithm} signatures are accepted.`)
  }
  const expires = need('X-Amz-Expires')
  if (!/^\d{1,7}$/.test(expires) || Number(expires) < 1 || Number(expires) > longestPresignSeconds) {
    throw new S3Error(
      'AuthorizationQueryParametersError',
      'X-Amz-Expires must lie between 1 and 604800 seconds.',
    )
  }
  return {
    ...parseCredential(need('X-Amz-Credential'), 'AuthorizationQueryParametersError'),
    timestamp: need('X-Amz-Date'),
    signedHeaders: need('X-Amz-SignedHeaders').split(';'),
    signature: need('X-Amz-Signature'),
    payloadHash: query.get('X-Amz-Content-Sha256') ?? 'UNSIGNED-PAYLOAD',
    expires: Number(expires),
  }
}

function parseTimestamp(timestamp: string): number {
  const match = /^(\d{4})(\d\d)(\d\d)T(\d\d)(\d\d)(\d\d)Z$/.exec(timestamp)
  const time = match
    ? Date.parse(`${match[1]}-${match[2]}-${match[3]}T${match[4]}:${match[5]}:${match[6]}Z`)
    : NaN
  if (Number.isNaN(time))
    throw new S3Error('AccessDenied', 'The date of the request must read yyyymmddThhmmssZ.')
  return time
}

function checkTime(claim: Claim, now: number): void {
  const signedAt = parseTimestamp(claim.timestamp)
  if (claim.expires === null) {
    if (Math.abs(now - signedAt) > skewMs) {
      throw new S3Error(
        'RequestTimeTooSkewed',
        'The clocks of the client and this server differ by more than 15 minutes.',
      )
    }
  } else if (signedAt - now > skewMs) {
    throw new S3Error('AccessDenied', 'Request is not valid yet.')
  } else if (now > signedAt + claim.expires * 1000) {
    throw new S3Error('AccessDenied', 'Request has expired.')
  }
}

function checkScope(claim: Claim, region: string, asksForLocation: boolean): void {
  const { day, region: given, service } = claim.scope
  const code = claim.expires === null ? 'AuthorizationHeaderMalformed' : 'AuthorizationQueryParametersError'
  // A client that asks where a bucket lies cannot know the region yet and signs for us-east-1.
  const regionFits = given === region || (asksForLocation && given === 'us-east-1')
  if (!regionFits) throw new S3Error(code, `The region '${given}' is wrong; expecting '${region}'.`)
  if (service !== 's3') throw new S3Error(code, `The service '${service}' is wrong; expecting 's3'.`)
  if (day !== claim.timestamp.slice(0, 8))
    throw new S3Error(code, 'The day of the credential is not that of the request.')
}

/** The host and every x-amz header must be under the signature, or it would protect nothing. */
function checkSignedHeaders(claim: Claim, lines: HeaderLine[]): void {
  const unsigned = lines
    .map(([name]) => name.toLowerCase())
    .filter((name) => name === 'host' || name.startsWith('x-amz-'))
    // The payload hash is itself the last line of the canonical request.
    .filter((name) => name !== 'x-amz-content-sha256' && !claim.signedHeaders.includes(name))
  if (unsigned.length > 0 || !claim.signedHeaders.includes('host')) {
    throw new S3Error(
      'AccessDenied',
      `There were headers which were not signed: ${unsigned.join(', ') || 'host'}.`,
    )
  }
}

/**
 * Verifies the signature of a request, in its Authorization header or its query. The body is not read: the returned hash
 * must be compared while it streams. Throws the S3 error that names the first thing wrong.
 */
export function authorise(request: IncomingMessage, credentials: Credentials, now: number): PayloadHash {
  const [path = '/', ...rest] = (request.url ?? '/').split('?')
  const query = rest.join('?')
  const parameters = new Map(parseQuery(query))
  const authorization = request.headers.authorization
  const presigned = parameters.has('X-Amz-Signature') || parameters.has('X-Amz-Algorithm')
  if (authorization === undefined && !presigned)
    throw new S3Error('AccessDenied', 'Anonymous access is not allowed.')
  if (authorization !== undefined && presigned) {
    throw new S3Error(
      'InvalidArgument',
      'Only one of the Authorization header and the X-Amz-Signature parameter may be used.',
    )
  }
  const claim = authorization === undefined ? claimOfQuery(parameters) : claimOfHeader(authorization, request)
  if (claim.accessKey !== credentials.accessKey) {
    throw new S3Error('InvalidAccessKeyId', 'The access key is not known here.')
  }
  checkTime(claim, now)
  checkScope(claim, credentials.region, parameters.has('location'))
  const headers = headerLines(request)
  checkSignedHeaders(claim, headers)
  const { method = 'GET' } = request
  const { signedHeaders, payloadHash, timestamp, scope } = claim
  const canonical = canonicalRequest({ method, path, query, headers, signedHeaders, payloadHash })
  const expected = signature(stringToSign(canonical, timestamp, scope), credentials.secretKey, scope)
  const given = Buffer.from(claim.signature)
  if (given.length !== expected.length || !timingSafeEqual(given, Buffer.from(expected))) {
    throw new S3Error(
      'SignatureDoesNotMatch',
      'The signature does not fit the request: check the secret key and how it signs.',
    )
  }
  return payloadHash
}

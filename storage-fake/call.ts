import type { IncomingMessage } from 'node:http'
import type { PayloadHash } from './authorisation.ts'
import type { Buckets } from './buckets.ts'
import type { Uploads } from './uploads.ts'

/** A request whose signature is verified, taken apart. */
export interface Call {
  request: IncomingMessage
  bucket: string
  key: string
  query: Map<string, string>
  payloadHash: PayloadHash
  /** Milliseconds since 1970. */
  now: number
  /** The caller may override governance retention and asks to. */
  bypassGovernance: boolean
  region: string
  buckets: Buckets
  uploads: Uploads
}

export interface Reply {
  status: number
  headers?: Record<string, string>
  xml?: string
  /** Bytes start..end (both included) of a file; for HEAD only their number is told. */
  file?: { path: string; start: number; end: number }
}

export function header(call: Call, name: string): string | undefined {
  const value = call.request.headers[name]
  return typeof value === 'string' ? value : undefined
}

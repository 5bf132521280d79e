import { z } from 'zod'

/**
 * The one table of errors. Each code has an HTTP status and a title; the sentence that says what happened, what is safe
 * and what to do is given where the error is raised. docs/errors.md and the OpenAPI document come from this table.
 */
export const problemTable = {
  'not-signed-in': { status: 401, title: 'Not signed in' },
  'foreign-origin': { status: 403, title: 'Request from another site' },
  'not-allowed': { status: 403, title: 'Not allowed' },
  'wrong-passphrase': { status: 403, title: 'Wrong passphrase' },
  'not-found': { status: 404, title: 'Not found' },
  'wrong-state': { status: 409, title: 'Not possible in this state' },
  'record-changed': { status: 409, title: 'The record has changed' },
  'record-expired': { status: 409, title: 'The prepared record has expired' },
  'signing-blocked': { status: 409, title: 'Signing is blocked' },
  'key-not-active': { status: 409, title: 'No active signing key' },
  'stale-content': { status: 412, title: 'Someone else saved first' },
  'too-large': { status: 413, title: 'Too large' },
  'unreadable-type': { status: 415, title: 'Unreadable type' },
  'range-not-satisfiable': { status: 416, title: 'Range outside the file' },
  'invalid-values': { status: 422, title: 'Values do not fit' },
  'unreadable-file': { status: 422, title: 'File cannot be read' },
  'upload-refused': { status: 422, title: 'Upload refused' },
  'signing-locked': { status: 423, title: 'Signing is locked' },
  'missing-precondition': { status: 428, title: 'If-Match is missing' },
  'too-many-requests': { status: 429, title: 'Too many requests' },
  internal: { status: 500, title: 'Something failed here' },
  'service-unavailable': { status: 503, title: 'A service is not reachable' },
} as const

export type ProblemCode = keyof typeof problemTable

export const fieldErrorSchema = z.object({ pointer: z.string(), detail: z.string() })
export type FieldError = z.infer<typeof fieldErrorSchema>

/** Body of an error answer (RFC 9457); members beyond these belong to the code, for example `attemptsLeft`. */
export const problemSchema = z.looseObject({
  type: z.string(),
  code: z.string(),
  title: z.string(),
  status: z.number().int(),
  detail: z.string(),
  errors: z.array(fieldErrorSchema).optional(),
})
export type ProblemBody = z.infer<typeof problemSchema>

/** An error that a person can act on; the HTTP layer turns it into problem+json. */
export class Problem extends Error {
  readonly code: ProblemCode
  readonly errors: FieldError[]
  readonly extra: Record<string, unknown>

  constructor(
    code: ProblemCode,
    detail: string,
    more: { errors?: FieldError[]; extra?: Record<string, unknown> } = {},
  ) {
    super(detail)
    this.name = 'Problem'
    this.code = code
    this.errors = more.errors ?? []
    this.extra = more.extra ?? {}
  }
}

/** The RFC 9457 body of a problem. */
export function problemBody(problem: Problem): ProblemBody {
  const { status, title } = problemTable[problem.code]
  return {
    type: `urn:halfsilver:problem:${problem.code}`,
    code: problem.code,
    title,
    status,
    detail: problem.message,
    ...(problem.errors.length > 0 ? { errors: problem.errors } : {}),
    ...problem.extra,
  }
}

/** One answer for what does not exist and for what the caller may not know of, so that nobody learns which it is. */
export function nothingHere(): Problem {
  return new Problem('not-found', 'There is nothing at this address, or you may not see it.')
}

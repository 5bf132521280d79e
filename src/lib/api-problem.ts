import { problemSchema, type FieldError, type ProblemBody } from '../../server/contract/problems.ts'

/** What a call failed with, in words for a person. `unreachable` is our own code: no answer came at all (status 0). */
export class ApiProblem extends Error {
  readonly code: string
  readonly status: number
  readonly title: string
  readonly detail: string
  readonly errors: FieldError[]
  /** Members that belong to the code, for example `attemptsLeft`. */
  readonly extra: Record<string, unknown>

  constructor(
    body: Pick<ProblemBody, 'code' | 'status' | 'title' | 'detail' | 'errors'>,
    extra: Record<string, unknown> = {},
  ) {
    super(body.detail)
    this.name = 'ApiProblem'
    this.code = body.code
    this.status = body.status
    this.title = body.title
    this.detail = body.detail
    this.errors = body.errors ?? []
    this.extra = extra
  }
}

/** The problem in an error answer; an answer that is none of ours (a proxy's page, say) is told by its status. */
export function problemFrom(status: number, body: unknown): ApiProblem {
  const parsed = problemSchema.safeParse(body)
  if (parsed.success) {
    const { type: _type, code, title, status: told, detail, errors, ...extra } = parsed.data
    return new ApiProblem({ code, title, status: told, detail, errors }, extra)
  }
  return new ApiProblem({
    code: status >= 500 ? 'service-unavailable' : 'internal',
    title: 'Something failed',
    status,
    detail: `The notebook server gave an answer that is not one of its own (status ${status}). Nothing was lost here; try again in a moment.`,
  })
}

/** No answer: the network or the server is away. */
export function unreachable(): ApiProblem {
  return new ApiProblem({
    code: 'unreachable',
    title: 'The notebook server does not answer',
    status: 0,
    detail:
      'The notebook server does not answer. What is on this screen is safe as long as the window stays open.',
  })
}

/** Whether trying the same again later can help. */
export function mayPass(error: unknown): boolean {
  return error instanceof ApiProblem && (error.status === 0 || error.status === 429 || error.status >= 500)
}

/** The sentence to show for anything thrown. */
export function sentenceOf(error: unknown): string {
  if (error instanceof ApiProblem) return error.detail
  return error instanceof Error ? error.message : 'Something failed that gave no reason.'
}

import type { ErrorRequestHandler, RequestHandler, Response } from 'express'
import { MulterError } from 'multer'
import { ConnectionAcquireTimeoutError, ConnectionError } from 'sequelize'
import { Problem, problemBody, problemTable, nothingHere } from '../../contract/problems.ts'
import type { Services } from '../services.ts'

/** Writes a problem as application/problem+json (RFC 9457). `retryAfterS` in its extra members becomes the header. */
export function sendProblem(res: Response, problem: Problem): void {
  const { status } = problemTable[problem.code]
  if (typeof problem.extra.retryAfterS === 'number')
    res.set('Retry-After', String(Math.ceil(problem.extra.retryAfterS)))
  if (status === 401) res.set('WWW-Authenticate', 'Bearer realm="halfsilver"')
  res
    .status(status)
    .type('application/problem+json')
    .send(JSON.stringify(problemBody(problem)))
}

/** The last handler: every error leaves as a problem. What is not one of ours tells nothing but an id for the log. */
export function answerProblems({ log }: Services): ErrorRequestHandler {
  return (error, req, res, next) => {
    const problem = asProblem(error)
    if (!problem || problem.code === 'service-unavailable')
      (req.log ?? log).error({ err: error as unknown, request: req.id }, 'request failed')
    if (res.headersSent) {
      next(error)
      return
    }
    res.removeHeader('Content-Disposition')
    res.removeHeader('ETag')
    const sentence =
      'Something failed on the server; what was saved before is safe. Try again, and if it stays, tell whoever runs it'
    sendProblem(res, problem ?? new Problem('internal', `${sentence}: request ${String(req.id)}.`))
  }
}

export const noSuchAddress: RequestHandler = () => {
  throw nothingHere()
}

/** Ours as it is; those of the body parsers by their kind; null for everything that must not be shown. */
function asProblem(error: unknown): Problem | null {
  if (error instanceof Problem) return error
  if (error instanceof MulterError) return uploadProblem(error)
  const type = error instanceof Error && 'type' in error ? String(error.type) : ''
  if (type === 'entity.parse.failed')
    return new Problem('invalid-values', 'The body is not JSON; nothing was changed.')
  if (type === 'entity.too.large')
    return new Problem('too-large', 'The values are larger than 5 MB; nothing was changed.')
  if (type.startsWith('charset.') || type.startsWith('encoding.'))
    return new Problem(
      'unreadable-type',
      'Send JSON as UTF-8 without a content encoding; nothing was changed.',
    )
  if (type === 'request.aborted')
    return new Problem('invalid-values', 'The request broke off; nothing was changed.')
  if (error instanceof ConnectionError || error instanceof ConnectionAcquireTimeoutError)
    return new Problem(
      'service-unavailable',
      'The database does not answer. Try again in a minute; nothing was changed.',
    )
  if (error instanceof URIError) return new Problem('not-found', 'The address cannot be read.')
  return null
}

function uploadProblem(error: MulterError): Problem {
  if (error.code === 'LIMIT_FILE_SIZE')
    return new Problem('too-large', 'The file is larger than this laboratory takes; nothing of it was kept.')
  return new Problem(
    'upload-refused',
    `The upload does not have the expected form (${error.message}); nothing of it was kept.`,
  )
}

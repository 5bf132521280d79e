import { randomUUID } from 'node:crypto'
import type { RequestHandler } from 'express'
import { pinoHttp } from 'pino-http'
import type { Logger } from '../logger.ts'

/**
 * One line per call with its id, which error answers name too. Of a request only method and path are logged: headers hold
 * cookies and tokens, and the query of a sign-in holds its code.
 */
export function requestLog(log: Logger): RequestHandler {
  return pinoHttp({
    logger: log,
    genReqId: () => randomUUID(),
    autoLogging: { ignore: ({ url = '' }) => !url.startsWith('/api/') && !url.startsWith('/auth/') },
    serializers: {
      req: ({ id, method, url = '' }: { id: string; method: string; url?: string }) => ({
        id,
        method,
        path: url.split('?')[0],
      }),
      res: ({ statusCode }: { statusCode: number }) => ({ statusCode }),
    },
  })
}

import { pino, type DestinationStream, type Logger } from 'pino'

export type { Logger }

/** What must never reach a log: cookies, tokens, proofs and whatever wraps a key (threat B6). */
const redacted = [
  'req.headers.cookie',
  'req.headers.authorization',
  'res.headers["set-cookie"]',
  '*.proof',
  '*.secret',
  '*.wrappedKey',
  '*.password',
]

/** Lines of JSON on standard output; LOG_LEVEL (info) says how much. */
export function openLog(name: string, destination?: DestinationStream): Logger {
  const options = {
    name,
    level: process.env.LOG_LEVEL ?? 'info',
    redact: { paths: redacted, censor: '[not logged]' },
  }
  return destination ? pino(options, destination) : pino(options)
}

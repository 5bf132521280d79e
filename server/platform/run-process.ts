import { inspect } from 'node:util'
import { ConfigError } from './config.ts'

/** What `run` gives back to stop what it started. */
export type Stop = () => Promise<void>

/**
 * Runs a process of the product: tells whoever started it that it is ready, stops in order on SIGTERM, SIGINT or when that
 * one has gone. A wrong configuration ends it with sentences, not with a stack.
 */
export async function runProcess(run: () => Promise<Stop>): Promise<void> {
  try {
    const stop = await run()
    let stopping = false
    const end = () => {
      if (stopping) return
      stopping = true
      stop().then(
        () => process.exit(0),
        (error: unknown) => {
          complain(error)
          process.exit(1)
        },
      )
    }
    for (const signal of ['SIGTERM', 'SIGINT', 'disconnect'] as const) process.on(signal, end)
    process.send?.('ready')
  } catch (error) {
    complain(error)
    process.exit(1)
  }
}

/** On standard error: a wrong configuration in its sentences, anything else with its stack. */
export function complain(error: unknown): void {
  process.stderr.write(`${error instanceof ConfigError ? error.message : inspect(error)}\n`)
}

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
          console.error(error)
          process.exit(1)
        },
      )
    }
    for (const signal of ['SIGTERM', 'SIGINT', 'disconnect'] as const) process.on(signal, end)
    process.send?.('ready')
  } catch (error) {
    console.error(error instanceof ConfigError ? error.message : error)
    process.exit(1)
  }
}

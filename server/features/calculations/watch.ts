import type { endpoints } from '../../contract/endpoints.ts'
import { openEventStream } from '../../platform/http/event-stream.ts'
import type { Context } from '../../platform/http/route.ts'
import type { Services } from '../../platform/services.ts'
import { changedChannel } from './announce.ts'
import { findCalculation, type CalculationRow } from './repository.ts'

const OVER = new Set<CalculationRow['status']>(['done', 'failed', 'cancelled'])

/**
 * Server-sent events of one calculation: `progress` while it waits or runs, then `outcome`, and the stream ends.
 * `mayStillRead` is asked before each event: rights that end close the stream (threat B20).
 */
export async function watchCalculation(
  services: Services,
  context: Context<typeof endpoints.watchCalculation>,
  mayStillRead: () => Promise<boolean>,
): Promise<void> {
  const { id } = context.params
  const stream = openEventStream(services, context)
  let telling = Promise.resolve()
  const silence = services.events.listen(changedChannel(id), () => void tell())
  void tell()
  await new Promise<void>((resolve) =>
    stream.ended.addEventListener('abort', () => resolve(), { once: true }),
  )
  silence()
  await telling

  /** One after another, so that the outcome is the last thing said. */
  function tell(): Promise<void> {
    telling = telling.then(send).catch((error: unknown) => {
      services.log.warn({ err: error, calculation: id }, 'an event stream failed')
      stream.close()
    })
    return telling
  }

  async function send() {
    const calculation = (await mayStillRead()) ? await findCalculation(services.db, id) : null
    if (calculation === null) return stream.close()
    const over = OVER.has(calculation.status)
    const { status, progress, error } = calculation
    stream.send(over ? 'outcome' : 'progress', { id, status, progress, error })
    if (over) stream.close()
  }
}

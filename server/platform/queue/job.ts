import type { z } from 'zod'
import type { QueueName } from './queues.ts'

export interface JobContext {
  id: string
  /** Aborts when the process is asked to stop and the grace time is over. */
  signal: AbortSignal
}

/** What serves a queue. A job that throws is tried again (with back-off) as often as its sender allowed. */
export interface Job<Data = unknown> {
  queue: QueueName
  /** How many of this queue run at once in one process. */
  concurrency: number
  data: z.ZodType<Data>
  run(data: Data, context: JobContext): Promise<void>
}

/** Declares a job; its data is parsed by the schema before it runs. */
export function job<Data>(
  queue: QueueName,
  data: z.ZodType<Data>,
  run: Job<Data>['run'],
  { concurrency = 1 }: { concurrency?: number } = {},
): Job {
  return { queue, concurrency, data, run: (given, context) => run(data.parse(given), context) }
}

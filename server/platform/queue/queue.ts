import PgBoss from 'pg-boss'
import { QueryTypes } from 'sequelize'
import type { Database, Transaction } from '../db/database.ts'
import type { Events } from '../events/events.ts'
import type { Logger } from '../logger.ts'
import type { Job } from './job.ts'
import { openPresence } from './presence.ts'
import { queueSchema, type QueueName } from './queues.ts'

export interface SendOptions {
  /** The job exists if and only if this transaction commits. */
  transaction?: Transaction
  /** Not before then: a time, or seconds from now. */
  startAfter?: Date | number
  /** With `singletonSeconds`: at most one job of this key in that many seconds. */
  singletonKey?: string
  singletonSeconds?: number
  /** How often a failed run is repeated (default 5, with growing pauses). */
  retryLimit?: number
}

export interface Queue {
  /** Answers the job's id, or null when its singleton key was taken. */
  send(queue: QueueName, data: object, options?: SendOptions): Promise<string | null>
  /** Serves a queue from now on. */
  work(job: Job, options?: { pollingS?: number }): Promise<void>
  /** Takes no new job and waits for those in flight. */
  stop(): Promise<void>
}

const POLLING_S = 0.5
const GRACE_MS = 30_000
/** A job whose process died while others go on serving its queue is taken up again after this time. */
const EXPIRE_HOURS = 2

/**
 * The queue over pg-boss under a role that can change rows only. Whoever sends also notifies, so that an idle process
 * starts the job at once; polling finds what a lost notification or a start time in the future left.
 */
export async function openQueue(url: string, db: Database, events: Events, log: Logger): Promise<Queue> {
  const boss = new PgBoss({
    connectionString: url,
    schema: queueSchema,
    migrate: false,
    schedule: false,
    max: 6,
  })
  boss.on('error', (error) => log.error({ err: error }, 'queue'))
  await boss.start()
  const presence = await openPresence(url)
  const stopping = new AbortController()
  const silence: (() => void)[] = []

  function joined(transaction: Transaction): PgBoss.Db {
    return {
      executeSql: async (text, values) => ({
        rows: await db.sequelize.query(text, {
          type: QueryTypes.SELECT,
          bind: values.map((value: unknown) => value ?? null),
          transaction,
          raw: true,
        }),
      }),
    }
  }

  async function send(queue: QueueName, data: object, options: SendOptions = {}) {
    const { transaction, retryLimit = 5, ...rest } = options
    const id = await boss.send(queue, data, {
      ...rest,
      retryLimit,
      retryDelay: 2,
      retryBackoff: true,
      expireInHours: EXPIRE_HOURS,
      ...(transaction ? { db: joined(transaction) } : {}),
    })
    if (id !== null) await events.notify(`queue:${queue}`, null, transaction)
    return id
  }

  async function work(job: Job, { pollingS = POLLING_S }: { pollingS?: number } = {}) {
    await presence.begin(job.queue)
    for (let slot = 0; slot < job.concurrency; slot++) {
      const worker = await boss.work(
        job.queue,
        { batchSize: 1, pollingIntervalSeconds: pollingS },
        async (jobs) => {
          for (const { id, data } of jobs) await runLogged(job, data, id)
        },
      )
      silence.push(events.listen(`queue:${job.queue}`, () => boss.notifyWorker(worker)))
    }
  }

  async function runLogged(job: Job, data: unknown, id: string) {
    const started = Date.now()
    try {
      await job.run(data, { id, signal: stopping.signal })
      log.info({ queue: job.queue, job: id, ms: Date.now() - started }, 'job done')
    } catch (error) {
      log.error({ err: error, queue: job.queue, job: id }, 'job failed')
      throw error
    }
  }

  return {
    send,
    work,
    async stop() {
      for (const end of silence) end()
      const abort = setTimeout(() => stopping.abort(new Error('the process stops')), GRACE_MS)
      await boss.stop({ graceful: true, wait: true, timeout: GRACE_MS + 5000 })
      clearTimeout(abort)
      await presence.end()
    },
  }
}

import type { Clock } from './clock.ts'
import type { Config } from './config.ts'
import type { Database } from './db/database.ts'
import type { Events } from './events/events.ts'
import type { Logger } from './logger.ts'
import type { Mail } from './mail/mail.ts'
import type { Queue } from './queue/queue.ts'
import type { ObjectStore } from './storage/object-store.ts'
import type { TimeStampTransport } from './timestamps/time-stamp.ts'

/** What a feature gets to work with. Built once per process by main.ts, worker.ts or cli.ts; tests build their own. */
export interface Services {
  config: Config
  clock: Clock
  log: Logger
  db: Database
  events: Events
  storage: ObjectStore
  queue: Queue
  mail: Mail
  /** Carries requests to the time-stamp authority; by HTTP to `config.timeStamps.url` when absent. */
  timeStamps?: TimeStampTransport
}

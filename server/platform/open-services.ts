import { systemClock, type Clock } from './clock.ts'
import type { Config } from './config.ts'
import { openDatabase } from './db/database.ts'
import { openEvents } from './events/events.ts'
import type { Logger } from './logger.ts'
import { openMail } from './mail/mail.ts'
import { openQueue } from './queue/queue.ts'
import type { Services } from './services.ts'
import { openObjectStore } from './storage/object-store.ts'

export interface OpenServices {
  services: Services
  /** Takes no new job, waits for those in flight, then lets go of everything. */
  close(): Promise<void>
}

/** Connects one process to everything it works with, under the role of `databaseUrl`. */
export async function openServices(
  config: Config,
  databaseUrl: string,
  log: Logger,
  clock: Clock = systemClock,
): Promise<OpenServices> {
  const db = openDatabase(databaseUrl, log)
  const events = await openEvents(databaseUrl, db, log)
  const queue = await openQueue(databaseUrl, db, events, log)
  const storage = openObjectStore(config.storage)
  const mail = openMail(db, queue, clock)
  return {
    services: { config, clock, log, db, events, storage, queue, mail },
    async close() {
      await queue.stop()
      await events.close()
      await db.close()
    },
  }
}

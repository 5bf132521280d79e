import { randomUUID } from 'node:crypto'
import type { Clock } from '../clock.ts'
import type { Database, Transaction } from '../db/database.ts'
import type { Queue } from '../queue/queue.ts'

export interface Letter {
  to: string
  subject: string
  text: string
}

export interface Mail {
  /** Puts a letter into the outbox; it is sent after the transaction commits, and tried again until it is gone. */
  enqueue(letter: Letter, t: Transaction): Promise<void>
}

const SEND_ATTEMPTS = 12

export function openMail(db: Database, queue: Queue, clock: Clock): Mail {
  return {
    async enqueue({ to, subject, text }, t) {
      const id = randomUUID()
      await db.run(
        `insert into work.outbox (id, recipient, subject, body, created_at) values (:id, :to, :subject, :text, :now)`,
        { id, to, subject, text, now: clock.now() },
        t,
      )
      await queue.send('send-mail', { id }, { transaction: t, retryLimit: SEND_ATTEMPTS })
    },
  }
}

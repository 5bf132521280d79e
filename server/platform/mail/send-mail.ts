import nodemailer from 'nodemailer'
import { z } from 'zod'
import { job } from '../queue/job.ts'
import type { Services } from '../services.ts'

interface OutboxRow {
  id: string
  recipient: string
  subject: string
  body: string
}

/**
 * The job that sends a letter of the outbox. A crash between sending and marking sends it twice, never not at all; the
 * message id is the row's, so that a mailbox can tell.
 */
export function sendMailJob({ config, db, clock }: Services) {
  const transport = nodemailer.createTransport(config.mail.smtpUrl, { from: config.mail.from })
  return job('send-mail', z.object({ id: z.uuid() }), async ({ id }) => {
    const letter = await db.row<OutboxRow>(
      'select id, recipient, subject, body from work.outbox where id = :id and sent_at is null',
      { id },
    )
    if (!letter) return
    try {
      await transport.sendMail({
        to: letter.recipient,
        subject: letter.subject,
        text: letter.body,
        messageId: `<${letter.id}@halfsilver>`,
      })
    } catch (error) {
      await db.run('update work.outbox set attempts = attempts + 1, last_error = :error where id = :id', {
        id,
        error: error instanceof Error ? error.message : String(error),
      })
      throw error
    }
    await db.run(
      'update work.outbox set attempts = attempts + 1, sent_at = :now, last_error = null where id = :id',
      {
        id,
        now: clock.now(),
      },
    )
  })
}

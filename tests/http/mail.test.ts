import { randomUUID } from 'node:crypto'
import { pino } from 'pino'
import { afterAll, beforeAll, expect, inject, test } from 'vitest'
import { readConfig } from '../../server/platform/config.ts'
import { sendMailJob } from '../../server/platform/mail/send-mail.ts'
import { openServices, type OpenServices } from '../../server/platform/open-services.ts'

let open: OpenServices
beforeAll(async () => {
  const config = readConfig(inject('environment'))
  open = await openServices(config, config.database.app, pino({ level: 'silent' }))
  await open.services.queue.work(sendMailJob(open.services))
})
afterAll(() => open.close())

interface Letter {
  subject: string
  text: string
  to: string[]
}

async function inbox(to: string): Promise<Letter[]> {
  return ((await (await fetch(`${inject('inboxUrl')}/letters.json?to=${to}`)).json()) as { items: Letter[] })
    .items
}

async function letters(to: string, withinMs: number): Promise<Letter[]> {
  for (
    const end = Date.now() + withinMs;
    Date.now() < end;
    await new Promise((done) => setTimeout(done, 50))
  ) {
    const found = await inbox(to)
    if (found.length > 0) return found
  }
  return []
}

test('a letter leaves when its transaction commits', async () => {
  const to = `${randomUUID()}@ridgeway.example`
  const subject = 'Witness asked: g²(0) of run 7 <script>alert(1)</script>'
  await open.services.db.transaction((t) =>
    open.services.mail.enqueue({ to, subject, text: 'Open N-07/042.' }, t),
  )
  expect(await letters(to, 10_000)).toMatchObject([{ subject, to: [to] }])
  const [row] = await open.services.db.rows<{ sent_at: Date | null }>(
    'select sent_at from work.outbox where recipient = :to',
    { to },
  )
  expect(row?.sent_at).not.toBeNull()
  const page = await (await fetch(inject('inboxUrl'))).text()
  expect(page).toContain('Witness asked')
  expect(page).not.toContain('<script>')
})

test('not when it is rolled back', async () => {
  const to = `${randomUUID()}@ridgeway.example`
  const send = open.services.db.transaction(async (t) => {
    await open.services.mail.enqueue({ to, subject: 'never', text: '' }, t)
    throw new Error('rolled back')
  })
  await expect(send).rejects.toThrow('rolled back')
  expect(await letters(to, 1000)).toEqual([])
})

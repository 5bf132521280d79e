/** Every queue there is. They are created by the migration (owner); API and worker may only use them. */
export const queueNames = [
  'read-file',
  'calculate',
  'verify-file',
  'stamp-signature',
  'render-evidence',
  'stamp-head',
  'build-export',
  'send-mail',
  'check-heads',
] as const

export type QueueName = (typeof queueNames)[number]

export const queueSchema = 'queue'

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

/** Queues that worker processes serve, under the role hs_worker; all others are served beside the API, under hs_app. */
export const workerQueues: readonly QueueName[] = ['read-file', 'calculate']

export const queueSchema = 'queue'

import pg from 'pg'
import { queueSchema, type QueueName } from './queues.ts'

/**
 * Tells that this process serves a queue, by a shared advisory lock that ends with its connection, however the process
 * ends. Whoever begins to serve a queue that nobody serves takes up the jobs that were running when their process died:
 * they count one attempt, so that a job that kills its process does not do so for ever.
 */
export interface Presence {
  begin(queue: QueueName): Promise<void>
  end(): Promise<void>
}

export async function openPresence(url: string): Promise<Presence> {
  const client = new pg.Client({
    connectionString: url,
    application_name: 'halfsilver presence',
    keepAlive: true,
  })
  await client.connect()
  client.on('error', () => undefined)

  async function isAlone(queue: QueueName): Promise<boolean> {
    const { rows } = await client.query<{ alone: boolean }>(
      'select pg_try_advisory_lock(hashtext($1)) as alone',
      [lockName(queue)],
    )
    return rows[0]?.alone ?? false
  }

  return {
    async begin(queue) {
      const alone = await isAlone(queue)
      if (alone) await client.query(takeUp, [queue])
      await client.query('select pg_advisory_lock_shared(hashtext($1))', [lockName(queue)])
      if (alone) await client.query('select pg_advisory_unlock(hashtext($1))', [lockName(queue)])
    },
    end: () => client.end(),
  }
}

const lockName = (queue: QueueName) => `halfsilver serves ${queue}`

const takeUp = `
  update ${queueSchema}.job
     set state = (case when retry_count < retry_limit then 'retry' else 'failed' end)::${queueSchema}.job_state,
         retry_count = retry_count + 1, start_after = now(),
         completed_on = case when retry_count < retry_limit then null else now() end
   where name = $1 and state = 'active'`

import { Piscina } from 'piscina'
import type { StoredReading } from './repository.ts'

export interface ReadingTask {
  fileId: string
  name: string
  objectKey: string
  objectVersion: string | null
  /** How to read it, when somebody said so. */
  choice: { format: string; options: Record<string, unknown> } | null
}

export interface ReadingPool {
  read(task: ReadingTask): Promise<StoredReading>
  /** Starts the first thread ahead of the first file. */
  warm(): void
  close(): Promise<void>
}

/** Threads that read files, so that neither the queue nor a heartbeat waits for a large one. */
export function openReadingPool(): ReadingPool {
  let pool: Piscina<ReadingTask, StoredReading> | null = null
  const opened = () =>
    (pool ??= new Piscina<ReadingTask, StoredReading>({
      filename: new URL('./reading-thread.ts', import.meta.url).href,
      minThreads: 1,
      maxThreads: 2,
      idleTimeout: 600_000,
    }))
  return {
    read: (task) => opened().run(task),
    warm: () => void opened(),
    close: async () => pool?.destroy(),
  }
}

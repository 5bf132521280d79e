import { availableParallelism } from 'node:os'
import { MessageChannel } from 'node:worker_threads'
import { Piscina } from 'piscina'
import type { FigureText } from '../../contract/calculations.ts'
import { Problem, type FieldError, type ProblemCode } from '../../contract/problems.ts'

/** What a thread is asked to compute; tag columns are fetched by it from the store. */
export interface ThreadTask {
  kind: string
  version: number
  parameters: Record<string, unknown>
  columnsKeys: string[]
}

export interface Computed {
  /** The bytes of result.json. */
  result: Uint8Array
  figures: FigureText[]
  notes: { code: string; detail: string }[]
}

/** A Problem does not survive the way between threads; it travels as this. */
export type ThreadAnswer = Computed | { problem: { code: ProblemCode; detail: string; errors: FieldError[] } }

export interface ComputePool {
  compute(
    task: ThreadTask & { signal: AbortSignal; progress: (done: number, of: number) => void },
  ): Promise<Computed>
  /** Starts the first thread ahead of the first calculation. */
  warm(): void
  close(): Promise<void>
}

/** Worker threads that run kernels, one for each core; cancelling ends the thread at once and the pool goes on. */
export function openComputePool(): ComputePool {
  let pool: Piscina<ThreadTask, ThreadAnswer> | null = null
  const opened = () =>
    (pool ??= new Piscina<ThreadTask, ThreadAnswer>({
      filename: new URL('./compute-thread.ts', import.meta.url).href,
      minThreads: 1,
      maxThreads: availableParallelism(),
      idleTimeout: 600_000,
    }))
  return {
    async compute({ signal, progress, ...task }) {
      const { port1, port2 } = new MessageChannel()
      port1.on('message', ({ done, of }: { done: number; of: number }) => progress(done, of))
      try {
        const answer = await opened().run({ ...task, port: port2 } as ThreadTask, {
          signal,
          transferList: [port2],
        })
        if ('problem' in answer)
          throw new Problem(answer.problem.code, answer.problem.detail, { errors: answer.problem.errors })
        return answer
      } finally {
        port1.close()
      }
    },
    warm: () => void opened(),
    close: async () => pool?.destroy(),
  }
}

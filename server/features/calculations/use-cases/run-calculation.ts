import { hostname } from 'node:os'
import { Problem, problemBody } from '../../../contract/problems.ts'
import { sha256Hex } from '../../../ledger-format/digest.ts'
import type { Services } from '../../../platform/services.ts'
import { waitForReading } from '../../files/index.ts'
import { appendEvent, workerActor } from '../../ledger/index.ts'
import { announce, cancelChannel } from '../announce.ts'
import { cacheKey } from '../cache-key.ts'
import type { Computed, ComputePool } from '../compute-pool.ts'
import {
  beginRun,
  fail,
  findCalculation,
  finish,
  insertResult,
  setProgress,
  type CalculationRow,
  type FileInput,
} from '../repository.ts'

const WORKER = `${hostname()}/${process.pid}`
/** A queued calculation waits this long for its file to be read. */
const READING_WAIT_MS = 10 * 60_000
const PROGRESS_MS = 300

/**
 * Computes one calculation under the worker's role. A failure is kept with the calculation, in words for the person who
 * asked; only a worker that dies leaves it to the queue, which gives it to another.
 */
export async function runCalculation(services: Services, pool: ComputePool, id: string): Promise<void> {
  const startedAt = services.clock.now()
  const calculation = await findCalculation(services.db, id)
  if (calculation === null || !(await mayRun(services, calculation))) return
  if (!(await beginRun(services.db, id, WORKER, startedAt))) return
  await announce(services, id)
  const stop = new AbortController()
  const silence = services.events.listen(cancelChannel(id), () => stop.abort())
  try {
    const { inputs, columnsKeys } = await readInputs(services, calculation)
    const computed = await pool.compute({
      kind: calculation.kind,
      version: calculation.version,
      parameters: calculation.parameters,
      columnsKeys,
      signal: stop.signal,
      progress: throttledProgress(services, id, startedAt),
    })
    await keep(services, calculation, inputs, computed, startedAt)
  } catch (error) {
    if (stop.signal.aborted) return
    await keepFailure(services, id, error)
  } finally {
    silence()
    await announce(services, id)
  }
}

async function mayRun(services: Services, calculation: CalculationRow): Promise<boolean> {
  if (calculation.status !== 'queued' && calculation.status !== 'running') return false
  const state = await services.db.row<{ state: string }>('select state from work.entries where id = :id', {
    id: calculation.entryId,
  })
  return state?.state === 'draft' || state?.state === 'submitted'
}

async function readInputs(
  services: Services,
  calculation: CalculationRow,
): Promise<{ inputs: FileInput[]; columnsKeys: string[] }> {
  const files = await Promise.all(
    calculation.inputs.map((input) => waitForReading(services, input.fileId, READING_WAIT_MS)),
  )
  const columnsKeys = files.map((file) => {
    if (file.readingStatus === 'ready' && file.columnsKey !== null) return file.columnsKey
    throw new Problem(
      'unreadable-file',
      `${file.name} cannot be read: ${file.readingDetail ?? 'its reading did not end.'} The file is safe; say how to read it and compute again.`,
    )
  })
  return {
    inputs: files.map((file) => ({
      fileId: file.id,
      sha256: file.sha256,
      readingSha256: file.readingSha256,
    })),
    columnsKeys,
  }
}

async function keep(
  services: Services,
  calculation: CalculationRow,
  inputs: FileInput[],
  computed: Computed,
  startedAt: Date,
): Promise<void> {
  const { id, kind, version, engine, parameters } = calculation
  const key = cacheKey({ kind, version, engine, parameters, inputs })
  if (key === null) throw new Error('a computed input has no reading')
  const resultSha256 = sha256Hex(computed.result)
  await services.db.transaction(async (t) => {
    await insertResult(services.db, resultSha256, computed.result, t)
    const kept = await finish(
      services.db,
      id,
      {
        inputs,
        cacheKey: key,
        resultSha256,
        figures: computed.figures,
        notes: computed.notes,
        worker: WORKER,
        startedAt,
        finishedAt: services.clock.now(),
      },
      t,
    )
    if (!kept) return
    await appendEvent(services, t, {
      actor: workerActor(calculation.createdBy),
      action: 'calculation.finished',
      subject: { kind: 'entry', id: calculation.entryId },
      payload: { calculationId: id, kind, version, engine, resultSha256 },
    })
  })
}

async function keepFailure(services: Services, id: string, error: unknown): Promise<void> {
  if (error instanceof Problem) return fail(services.db, id, problemBody(error), services.clock.now())
  services.log.error({ err: error, calculation: id }, 'a calculation failed')
  const problem = new Problem(
    'internal',
    'The calculation failed for a reason of the program, not of your data. The inputs are safe; compute again, and tell the laboratory manager if it fails again.',
  )
  return fail(services.db, id, problemBody(problem), services.clock.now())
}

function throttledProgress(
  services: Services,
  id: string,
  startedAt: Date,
): (done: number, of: number) => void {
  let last = 0
  return (done, of) => {
    const now = Date.now()
    if (now - last < PROGRESS_MS) return
    last = now
    const spentS = (services.clock.now().getTime() - startedAt.getTime()) / 1000
    const leftS = done > 0 ? (spentS * (of - done)) / done : null
    setProgress(services.db, id, { done, of, leftS })
      .then(() => announce(services, id))
      .catch((error: unknown) => services.log.warn({ err: error }, 'progress was not kept'))
  }
}

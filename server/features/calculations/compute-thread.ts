import type { MessagePort } from 'node:worker_threads'
import type { FigureText } from '../../contract/calculations.ts'
import { Problem } from '../../contract/problems.ts'
import { figureText } from '../../contract/quantity-text.ts'
import type { TagRecord } from '../../contract/tag-record.ts'
import { decodeColumns } from '../../ingest/columns.ts'
import { figuresOf } from '../../physics/figures.ts'
import { kindDefinition } from '../../physics/registry.ts'
import { readConfig } from '../../platform/config.ts'
import { openObjectStore } from '../../platform/storage/object-store.ts'
import type { ThreadAnswer, ThreadTask } from './compute-pool.ts'

const store = openObjectStore(readConfig(process.env, 'worker').storage)

/** Records used last stay in the thread, so that a changed parameter does not fetch them again. */
const RECORDS_KEPT = 3
const records = new Map<string, TagRecord>()

/** Runs in a worker thread: fetches the tag columns, computes, and answers the bytes of result.json. */
export default async function compute(task: ThreadTask & { port: MessagePort }): Promise<ThreadAnswer> {
  try {
    const definition = kindDefinition(task.kind, task.version)
    const inputs = []
    for (const key of task.columnsKeys) inputs.push({ record: await loadRecord(key) })
    const { compute: run } = await definition.load()
    const { result, notes } = run({
      parameters: task.parameters,
      inputs,
      progress: (done, of) => task.port.postMessage({ done, of }),
    })
    return { result: Buffer.from(JSON.stringify(result)), figures: reportedAsText(task, result), notes }
  } catch (error) {
    if (!(error instanceof Problem)) throw error
    return { problem: { code: error.code, detail: error.message, errors: error.errors } }
  } finally {
    task.port.close()
  }
}

/** Figures as they are shown, quoted and signed: rounded to the uncertainty. */
function reportedAsText({ kind, version }: ThreadTask, result: unknown): FigureText[] {
  return figuresOf(kind, result, version).map(({ pointer, label, value, u, unit }) => ({
    pointer,
    label,
    ...figureText(value, u),
    unit,
  }))
}

async function loadRecord(key: string): Promise<TagRecord> {
  const kept = records.get(key)
  const record = kept ?? decodeColumns(await store.getBytes(key))
  records.delete(key)
  records.set(key, record)
  for (const oldest of records.keys()) {
    if (records.size <= RECORDS_KEPT) break
    records.delete(oldest)
  }
  return record
}

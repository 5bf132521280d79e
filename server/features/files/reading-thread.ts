import { encodeColumns } from '../../ingest/columns.ts'
import { createParser, detectReading, formatVersion } from '../../ingest/registry.ts'
import { UnreadableFile } from '../../ingest/unreadable-file.ts'
import type { Reading } from '../../ingest/reading.ts'
import { readingSha256 } from '../../ledger-format/content.ts'
import { readConfig } from '../../platform/config.ts'
import { openObjectStore } from '../../platform/storage/object-store.ts'
import type { ReadingTask } from './reading-pool.ts'
import { nothingFound, type ReadingSummary, type StoredReading } from './repository.ts'

const store = openObjectStore(readConfig(process.env, 'worker').storage)

/** Bytes from which the form of a file is recognised. */
const HEAD_BYTES = 64 * 1024

type Way = { format: string; version: number; options: Record<string, unknown>; doubt: string | null }

const NOTHING: StoredReading = {
  status: 'unreadable',
  format: null,
  version: null,
  options: null,
  sha256: null,
  summary: null,
  detail: null,
  columnsKey: null,
}

/** Runs in a worker thread: reads the bytes from the store, in pieces, and keeps what it finds as columns. */
export default async function read(task: ReadingTask): Promise<StoredReading> {
  const way = await findWay(task)
  if ('unreadable' in way) return { ...NOTHING, detail: way.unreadable }
  try {
    return await keep(task, way, await parse(task, way))
  } catch (error) {
    if (!(error instanceof UnreadableFile)) throw error
    const { format, version, options } = way
    return { ...NOTHING, format, version, options, detail: error.message }
  }
}

async function findWay(task: ReadingTask): Promise<Way | { unreadable: string }> {
  if (task.choice !== null) return { ...task.choice, version: formatVersion(task.choice.format), doubt: null }
  const head = await store.getBytes(task.objectKey, task.objectVersion ?? undefined, {
    offset: 0,
    length: HEAD_BYTES,
  })
  const found = detectReading(head, task.name)
  if ('unreadable' in found) return found
  const { format, version, options, doubt } = found
  return { format, version, options, doubt }
}

async function parse(task: ReadingTask, way: Way): Promise<Reading> {
  const parser = createParser(way.format, way.version, way.options)
  for await (const chunk of await store.get(task.objectKey, task.objectVersion ?? undefined))
    parser.push(chunk as Uint8Array)
  return parser.finish()
}

async function keep(task: ReadingTask, way: Way, reading: Reading): Promise<StoredReading> {
  const { format, version, options } = way
  const sha256 = readingSha256({ format, version, options })
  const columnsKey = `columns/${task.fileId}-${sha256.slice(0, 16)}`
  if (reading.kind === 'tags') await store.putBytes(columnsKey, encodeColumns(reading.record))
  return {
    status: 'ready',
    format,
    version,
    options,
    sha256,
    summary: summarise(reading),
    detail: reading.kind === 'other' ? reading.detail : way.doubt,
    columnsKey: reading.kind === 'tags' ? columnsKey : null,
  }
}

function summarise(reading: Reading): ReadingSummary {
  if (reading.kind !== 'tags') return { ...nothingFound, kind: reading.kind }
  const { tags, durationPs, firstPs, lastPs, resolutionPs, outOfOrder, channels } = reading.summary
  return {
    kind: 'tags',
    tags,
    durationPs: plain(durationPs),
    firstPs: plain(firstPs),
    lastPs: plain(lastPs),
    resolutionPs: plain(resolutionPs),
    outOfOrder,
    channels,
  }
}

/** Picoseconds as the interface gives them: a number below 2^53, else digits. */
function plain(ps: bigint): number | string {
  return ps > BigInt(Number.MAX_SAFE_INTEGER) || ps < BigInt(Number.MIN_SAFE_INTEGER)
    ? String(ps)
    : Number(ps)
}

import type { Services } from '../../../platform/services.ts'
import { findFile, storeReading } from '../repository.ts'
import type { ReadingPool } from '../reading-pool.ts'

/** Reads a file in a thread, as it was chosen or as is found by itself, and keeps the columns and the summary. */
export async function readFile(services: Services, pool: ReadingPool, fileId: string): Promise<void> {
  const file = await findFile(services.db, fileId)
  if (file === null || file.readingStatus !== 'pending') return
  const choice =
    file.readingFormat === null ? null : { format: file.readingFormat, options: file.readingOptions ?? {} }
  const found = await pool.read({
    fileId,
    name: file.name,
    objectKey: file.objectKey,
    objectVersion: file.objectVersion,
    choice,
  })
  await storeReading(services.db, fileId, found)
}

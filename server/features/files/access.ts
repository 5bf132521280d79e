import { nothingHere } from '../../contract/problems.ts'
import type { Actor } from '../../platform/http/actor.ts'
import type { Services } from '../../platform/services.ts'
import { requireNotebook } from '../notebooks/index.ts'
import { findFile, type FileRow } from './repository.ts'

/** A file that the caller may read. */
export async function requireFile(services: Services, actor: Actor, fileId: string): Promise<FileRow> {
  const file = await findFile(services.db, fileId)
  if (file === null) throw nothingHere()
  await requireNotebook(services, actor, file.notebookId, 'read')
  return file
}

import type { RawFile, Reading } from '../../contract/files.ts'
import type { Actor } from '../../platform/http/actor.ts'
import type { Services } from '../../platform/services.ts'
import { filesWithSameBytes, nothingFound, type FileRow } from './repository.ts'

export function presentReading(file: FileRow): Reading {
  return {
    ...nothingFound,
    ...file.readingSummary,
    status: file.readingStatus,
    format: file.readingFormat,
    version: file.readingVersion,
    options: file.readingOptions,
    detail: file.readingDetail,
  }
}

/** Files as the caller sees them, with a word where the same bytes are here already. */
export async function presentFiles(
  services: Services,
  actor: Actor,
  files: readonly FileRow[],
): Promise<RawFile[]> {
  const twins = await filesWithSameBytes(
    services.db,
    [...new Set(files.map((file) => file.sha256))],
    actor.personId,
  )
  return files.map((file) => ({
    id: file.id,
    entryId: file.entryId,
    runId: file.runId,
    name: file.name,
    size: Number(file.size),
    sha256: file.sha256,
    state: file.state,
    uploadedBy: file.uploadedBy,
    uploadedByName: file.uploadedByName,
    uploadedAt: file.uploadedAt.toISOString(),
    sameBytesAs: twins
      .filter((twin) => twin.sha256 === file.sha256 && twin.id !== file.id)
      .map((twin) => ({ fileId: twin.id, name: twin.name })),
    reading: presentReading(file),
  }))
}

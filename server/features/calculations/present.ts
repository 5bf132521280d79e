import type { Calculation } from '../../contract/calculations.ts'
import type { Services } from '../../platform/services.ts'
import { findFile, type FileRow } from '../files/index.ts'
import { resultBytes, type CalculationRow } from './repository.ts'

/** A calculation is stale when an input is read in another way now than it was for the computation. */
export function isStale(
  calculation: CalculationRow,
  files: ReadonlyMap<string, Pick<FileRow, 'readingSha256'>>,
): boolean {
  if (calculation.status !== 'done') return false
  return calculation.inputs.some((input) => files.get(input.fileId)?.readingSha256 !== input.readingSha256)
}

/** Files that these calculations take, by id. */
export async function inputFiles(
  services: Services,
  calculations: readonly CalculationRow[],
): Promise<Map<string, FileRow>> {
  const ids = [
    ...new Set(calculations.flatMap((calculation) => calculation.inputs.map((input) => input.fileId))),
  ]
  const files = await Promise.all(ids.map((id) => findFile(services.db, id)))
  return new Map(files.filter((file) => file !== null).map((file) => [file.id, file]))
}

/** A calculation without its result, as an entry lists it. */
export function presentSummary(calculation: CalculationRow, files: ReadonlyMap<string, FileRow>) {
  const { id, kind, status, figures } = calculation
  return { id, label: `C${calculation.label}`, kind, status, stale: isStale(calculation, files), figures }
}

export async function presentCalculation(
  services: Services,
  calculation: CalculationRow,
): Promise<Calculation> {
  const files = await inputFiles(services, [calculation])
  const { entryId, version, engine, progress, parameters, resultSha256, notes, error } = calculation
  return {
    ...presentSummary(calculation, files),
    entryId,
    version,
    engine,
    progress,
    parameters,
    inputs: calculation.inputs.map(({ fileId, sha256 }) => ({
      fileId,
      sha256,
      name: files.get(fileId)?.name ?? 'unknown',
    })),
    result:
      resultSha256 === null
        ? null
        : (JSON.parse((await resultBytes(services.db, resultSha256)).toString('utf8')) as Record<
            string,
            unknown
          >),
    resultSha256,
    provenance: provenance(calculation),
    notes,
    error,
  }
}

function provenance({
  engine,
  inputs,
  startedAt,
  finishedAt,
  worker,
  status,
}: CalculationRow): Calculation['provenance'] {
  if (status !== 'done' || startedAt === null || finishedAt === null) return null
  return {
    engine,
    inputs: inputs.map(({ fileId, sha256, readingSha256 }) => ({
      fileId,
      sha256,
      readingSha256: readingSha256 ?? '',
    })),
    startedAt: startedAt.toISOString(),
    finishedAt: finishedAt.toISOString(),
    worker: worker ?? 'unknown',
  }
}

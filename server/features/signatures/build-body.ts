import type { RecordBody, RecordCalculation, RecordFile } from '../../ledger-format/record-body.ts'
import { buildBody, type BuiltBody } from '../../ledger-format/record.ts'
import { readingSha256 } from '../../ledger-format/content.ts'
import type { Transaction } from '../../platform/db/database.ts'
import type { Services } from '../../platform/services.ts'
import type { CalculationRow } from '../calculations/index.ts'
import { entryNumber, findEntry, revisionsOf, writtenBetween, type EntryRow } from '../entries/index.ts'
import type { FileRow } from '../files/index.ts'
import { laboratory } from '../laboratory/index.ts'
import { notebookNumber } from '../notebooks/index.ts'
import { runNumber, type RunRow } from '../runs/index.ts'
import { contributorsOf } from './contributors.ts'
import type { Gathered } from './gather.ts'
import { quotesWithValues } from './quotes.ts'
import { exceptionsOf, returnsOf, signaturesOf } from './repository.ts'

/**
 * Builds what every signer of an entry signs alike, from the rows as they are in this transaction. To be called only when
 * nothing blocks signing.
 */
export async function buildEntryBody(
  services: Pick<Services, 'db'>,
  gathered: Gathered,
  t: Transaction,
): Promise<BuiltBody> {
  const { entry } = gathered
  const home = await laboratory(services, t)
  const quotes = await quotesWithValues(services, gathered, t)
  return buildBody({
    laboratory: { id: home.id, name: home.name, demo: home.demo },
    notebook: {
      id: entry.notebookId,
      number: notebookNumber(entry.notebookNumber),
      title: entry.notebookTitle,
    },
    entry: await entryPart(services, entry, t),
    authors: await authorsOf(services, entry, t),
    contributors: await contributorsOf(services, gathered, t),
    content: gathered.document as unknown as RecordBody['content'],
    runs: gathered.runs.map(runPart),
    files: gathered.files.map(filePart),
    calculations: gathered.used.map((calculation) => calculationPart(calculation, gathered)),
    quotes: quotes.map(({ nodeId, calculationId, pointer, shown }) => ({
      nodeId,
      calculationId,
      pointer,
      shown: shown ?? '',
    })),
    history: await historyOf(services, entry.id, t),
  })
}

async function entryPart(
  services: Pick<Services, 'db'>,
  entry: EntryRow,
  t: Transaction,
): Promise<RecordBody['entry']> {
  const written = await writtenBetween(services.db, entry.id, t)
  const amended = entry.amendsEntryId === null ? null : await findEntry(services.db, entry.amendsEntryId, t)
  return {
    id: entry.id,
    number: entryNumber(entry),
    title: entry.title,
    experiment: entry.experiment,
    revision: entry.revision,
    workDate: entry.workDate,
    writtenFrom: written?.first.toISOString() ?? null,
    writtenTo: written?.last.toISOString() ?? null,
    lateRemark: entry.lateRemark,
    important: entry.important,
    witnessesRequired: entry.witnessesRequired,
    amends:
      amended && entry.amendsBodySha256
        ? { entryId: amended.id, number: entryNumber(amended), bodySha256: entry.amendsBodySha256 }
        : null,
  }
}

/** Whoever wrote a revision, by token or not. */
async function authorsOf(
  services: Pick<Services, 'db'>,
  entry: EntryRow,
  t: Transaction,
): Promise<RecordBody['authors']> {
  const authors = new Map<string, RecordBody['authors'][number]>()
  for (const { personId, author, revision } of await revisionsOf(services.db, entry.id, t)) {
    const known = authors.get(personId) ?? {
      subjectId: personId,
      name: author,
      revisions: [],
      exception: null,
    }
    known.revisions.push(revision)
    authors.set(personId, known)
  }
  for (const { personId, reason, byPerson, at } of await exceptionsOf(services.db, entry.id, t)) {
    const author = authors.get(personId)
    if (author) author.exception = { reason, bySubjectId: byPerson, time: at.toISOString() }
  }
  return [...authors.values()]
}

function runPart(run: RunRow): RecordBody['runs'][number] {
  return {
    id: run.id,
    number: runNumber(run.number),
    experiment: run.experiment,
    startedAt: run.startedAt.toISOString(),
    durationPs: run.durationPs,
    conditions: run.conditions.map(({ name, value, u, unit }) => ({
      name,
      value,
      u,
      unit: unit === '' ? null : unit,
    })),
    apparatus: run.apparatus.map((piece) => ({ ...piece })),
    cautions: run.cautions.map((caution) => ({ ...caution })),
  }
}

function filePart(file: FileRow): RecordFile {
  return {
    id: file.id,
    runId: file.runId,
    name: file.name,
    size: file.size,
    sha256: file.sha256,
    uploadedBy: file.uploadedBy,
    uploadedAt: file.uploadedAt.toISOString(),
    via: file.via,
    reading: readingPart(file),
  }
}

function readingPart({
  readingStatus,
  readingFormat,
  readingVersion,
  readingOptions,
}: FileRow): RecordFile['reading'] {
  if (readingStatus !== 'ready' || readingFormat === null || readingVersion === null) return null
  const reading = {
    format: readingFormat,
    version: readingVersion,
    options: (readingOptions ?? {}) as RecordBody['content'],
  }
  return { ...reading, sha256: readingSha256(reading) }
}

function calculationPart(calculation: CalculationRow, { entry, inputs, homes }: Gathered): RecordCalculation {
  if (calculation.resultSha256 === null || calculation.finishedAt === null)
    throw new Error(`C${calculation.label} has no result.`)
  return {
    id: calculation.id,
    label: `C${calculation.label}`,
    kind: calculation.kind,
    version: calculation.version,
    engine: calculation.engine,
    parameters: calculation.parameters as RecordBody['content'],
    inputs: calculation.inputs.map(({ fileId, sha256, readingSha256: reading }) => {
      const homeId = inputs.get(fileId)?.homeEntryId ?? ''
      const home = homes.get(homeId)
      return {
        fileId,
        sha256,
        readingSha256: reading ?? '',
        homeEntry: homeId === entry.id || !home ? null : { entryId: home.id, number: entryNumber(home) },
      }
    }),
    resultSha256: calculation.resultSha256,
    finishedAt: calculation.finishedAt.toISOString(),
    figures: calculation.figures.map(({ pointer, label, value, u, unit }) => ({
      pointer,
      label,
      value,
      u,
      unit,
    })),
    notes: calculation.notes.map(({ code, detail }) => ({
      code,
      detail: detail === '' ? null : detail,
      answer: null,
    })),
  }
}

async function historyOf(
  services: Pick<Services, 'db'>,
  entryId: string,
  t: Transaction,
): Promise<RecordBody['history']> {
  const returns = await returnsOf(services.db, entryId, t)
  const voided = (await signaturesOf(services.db, [entryId], t)).filter(({ voidedAt }) => voidedAt !== null)
  return {
    returns: returns.map(({ byPerson, reason, at }) => ({
      bySubjectId: byPerson,
      reason,
      time: at.toISOString(),
    })),
    voided: voided.map(({ recordSha256, signatureSha256, voidedAt }) => ({
      recordSha256,
      signatureSha256,
      time: (voidedAt as Date).toISOString(),
    })),
  }
}

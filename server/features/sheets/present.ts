import type { Entry, EntrySummary } from '../../contract/entries.ts'
import { entryActions, notebookRights } from '../../contract/policy.ts'
import type { Actor } from '../../platform/http/actor.ts'
import type { Services } from '../../platform/services.ts'
import { calculationsIn, type NormalDocument } from '../../document/index.ts'
import {
  calculationsOfEntry,
  inputFiles,
  presentSummary,
  type CalculationRow,
} from '../calculations/index.ts'
import {
  addendaOf,
  contentOfSave,
  entryNumber,
  findEntry,
  hasContributed,
  writersOf,
  type EntryRow,
} from '../entries/index.ts'
import { filesOfEntry, presentFiles } from '../files/index.ts'
import { findMembership } from '../notebooks/index.ts'
import { presentRuns, runsOfEntry } from '../runs/index.ts'
import {
  entrySignatures,
  lastReturn,
  sealOf,
  signingBlocks,
  type PlacedSignature,
} from '../signatures/index.ts'

/** Entries as lists show them. */
export async function presentSummaries(
  services: Services,
  entries: readonly EntryRow[],
): Promise<EntrySummary[]> {
  const ids = entries.map((entry) => entry.id)
  const [writers, signatures] = await Promise.all([
    writersOf(services.db, ids),
    entrySignatures(services, ids),
  ])
  return entries.map((entry) => ({
    id: entry.id,
    notebookId: entry.notebookId,
    number: entryNumber(entry),
    title: entry.title,
    experiment: entry.experiment,
    state: entry.state,
    phase: entry.phase,
    important: entry.important,
    authors: writers
      .filter((writer) => writer.entryId === entry.id)
      .map(({ personId, name }) => ({ personId, name, signed: hasSigned(signatures, entry.id, personId) })),
    createdAt: entry.createdAt.toISOString(),
    updatedAt: entry.updatedAt.toISOString(),
    submittedAt: entry.phase === 'with-witness' ? (entry.submittedAt?.toISOString() ?? null) : null,
  }))
}

function hasSigned(signatures: readonly PlacedSignature[], entryId: string, personId: string): boolean {
  return signatures.some(
    (s) => s.entryId === entryId && s.meaning === 'authorship' && !s.voided && s.signer.personId === personId,
  )
}

/** An entry with all that hangs on it, and what this caller may do with it. */
export async function presentEntry(services: Services, actor: Actor, entry: EntryRow): Promise<Entry> {
  const { db } = services
  const [[summary], runs, files, calculations, signatures, amendments, original] = await Promise.all([
    presentSummaries(services, [entry]),
    runsOfEntry(db, entry.id),
    filesOfEntry(db, entry.id),
    calculationsOfEntry(db, entry.id),
    entrySignatures(services, [entry.id]),
    addendaOf(db, entry.id),
    entry.amendsEntryId === null ? null : findEntry(db, entry.amendsEntryId),
  ])
  const current = await currentCalculations(services, entry, calculations)
  const inputs = await inputFiles(services, current)
  const witnessed = signatures.filter((s) => s.meaning !== 'authorship' && !s.voided)
  return {
    ...(summary as EntrySummary),
    runAt: entry.runAt.toISOString(),
    workDate: entry.workDate,
    lateRemark: entry.lateRemark,
    revision: entry.revision,
    contentSha256: entry.contentSha256,
    bodySha256: entry.bodySha256,
    runs: await presentRuns(services, actor, runs),
    files: await presentFiles(services, actor, files),
    calculations: current.map((calculation) => presentSummary(calculation, inputs)),
    signatures: signatures.map(({ entryId: _, ...signature }) => signature),
    witnesses: {
      required: entry.witnessesRequired,
      given: new Set(witnessed.map((s) => s.signer.personId)).size,
    },
    returned: entry.phase === 'returned' ? await lastReturn(services, entry.id) : null,
    amends:
      original === null || entry.amendsBodySha256 === null
        ? null
        : { entryId: original.id, number: entryNumber(original), bodySha256: entry.amendsBodySha256 },
    amendedBy: amendments.map((addendum) => ({ entryId: addendum.id, number: entryNumber(addendum) })),
    seal: await sealOf(services, entry.id),
    blocks: entry.state === 'draft' ? await signingBlocks(services, entry) : [],
    allowed: await allowedTo(services, actor, entry, signatures),
  }
}

/** Those that stand in the text, and of each label the newest; what a successor has replaced is history. */
async function currentCalculations(
  services: Services,
  entry: EntryRow,
  calculations: readonly CalculationRow[],
): Promise<CalculationRow[]> {
  const content = await contentOfSave(services.db, entry.id, entry.saveNumber)
  const placed = new Set(content === null ? [] : calculationsIn(content as NormalDocument))
  const placedLabels = new Set(calculations.filter(({ id }) => placed.has(id)).map(({ label }) => label))
  const newest = new Map(calculations.map(({ label, id }) => [label, id]))
  return calculations.filter(
    ({ id, label }) => placed.has(id) || (!placedLabels.has(label) && newest.get(label) === id),
  )
}

async function allowedTo(
  services: Services,
  actor: Actor,
  entry: EntryRow,
  signatures: readonly PlacedSignature[],
): Promise<Entry['allowed']> {
  const membership = await findMembership(services.db, entry.notebookId, actor.personId)
  const own = signatures.filter((s) => !s.voided && s.signer.personId === actor.personId)
  const writers = await writersOf(services.db, [entry.id])
  return entryActions(entry.phase, {
    rights: notebookRights(actor.roles, membership),
    author: writers.some((writer) => writer.personId === actor.personId),
    contributed: await hasContributed(services.db, entry.id, actor.personId),
    signedAsAuthor: own.some((s) => s.meaning === 'authorship'),
    witnessed: own.some((s) => s.meaning !== 'authorship'),
  })
}

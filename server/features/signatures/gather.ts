import { calculationsIn, emptyDocument, type NormalDocument } from '../../document/index.ts'
import type { Database, Transaction } from '../../platform/db/database.ts'
import type { Services } from '../../platform/services.ts'
import { calculationsOfEntry, type CalculationRow } from '../calculations/index.ts'
import { contentOfSave, findEntry, type EntryRow } from '../entries/index.ts'
import { filesOfEntry, findFile, type FileRow } from '../files/index.ts'
import { runsOfEntry, type RunRow } from '../runs/index.ts'

/** What an entry consists of when it is to be signed. */
export interface Gathered {
  entry: EntryRow
  document: NormalDocument
  runs: RunRow[]
  files: FileRow[]
  /** Every calculation of the entry, also those that the text does not use. */
  calculations: CalculationRow[]
  /** Those placed or quoted in the text: only these are signed and block signing. */
  used: CalculationRow[]
  /** Ids in the text of calculations that the entry does not have. */
  unknown: string[]
  /** Files that the used calculations take, by id; some may be of other entries. */
  inputs: Map<string, FileRow>
  /** Entries to which such files belong, by id. */
  homes: Map<string, EntryRow>
}

/** Reads all of it in the caller's transaction. */
export async function gather(
  services: Pick<Services, 'db'>,
  entry: EntryRow,
  t?: Transaction,
): Promise<Gathered> {
  const { db } = services
  const content = await contentOfSave(db, entry.id, entry.saveNumber, t)
  const document = (content ?? emptyDocument()) as NormalDocument
  const runs = await runsOfEntry(db, entry.id, t)
  const files = await filesOfEntry(db, entry.id, t)
  const calculations = await calculationsOfEntry(db, entry.id, t)
  const ids = calculationsIn(document)
  const used = calculations.filter(({ id }) => ids.includes(id))
  const inputs = await inputsOf(db, used, t)
  return {
    entry,
    document,
    runs,
    files,
    calculations,
    used,
    unknown: ids.filter((id) => !used.some((calculation) => calculation.id === id)),
    inputs,
    homes: await homesOf(db, inputs, entry, t),
  }
}

async function inputsOf(
  db: Database,
  used: CalculationRow[],
  t?: Transaction,
): Promise<Map<string, FileRow>> {
  const found = new Map<string, FileRow>()
  for (const id of new Set(used.flatMap(({ inputs }) => inputs.map(({ fileId }) => fileId)))) {
    const file = await findFile(db, id, t)
    if (file) found.set(id, file)
  }
  return found
}

async function homesOf(
  db: Database,
  inputs: Map<string, FileRow>,
  entry: EntryRow,
  t?: Transaction,
): Promise<Map<string, EntryRow>> {
  const homes = new Map<string, EntryRow>()
  for (const { homeEntryId } of inputs.values()) {
    if (homeEntryId === null || homeEntryId === entry.id || homes.has(homeEntryId)) continue
    const home = await findEntry(db, homeEntryId, t)
    if (home) homes.set(homeEntryId, home)
  }
  return homes
}

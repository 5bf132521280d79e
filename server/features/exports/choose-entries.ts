import type { LeftOut } from '../../ledger-format/bundle/index.ts'
import { payloadOf, type LedgerEvent } from '../../ledger-format/event.ts'
import type { Services } from '../../platform/services.ts'
import { addendaOf, entryNumber, findEntry, type EntryRow } from '../entries/index.ts'
import { eventsOf } from '../ledger/index.ts'
import { runsOfEntry } from '../runs/index.ts'

type LeftOutEntry = Extract<LeftOut, { kind: 'entry' }>

export interface ChosenEntry {
  entry: EntryRow
  /** Events of the entry and of the runs filed into it. */
  events: LedgerEvent[]
}

export interface Chosen {
  entries: ChosenEntry[]
  leftOut: LeftOutEntry[]
  /** Sequence of the last `entry.rendered` among the entries: the size of the bundle's head. */
  treeSize: number
}

/** The sealed entries among those given and, in turn, their sealed addenda. */
export async function withAddenda(services: Services, entries: readonly EntryRow[]): Promise<EntryRow[]> {
  const found = new Map<string, EntryRow>()
  const toVisit = entries.filter(({ state }) => state === 'sealed')
  for (let entry = toVisit.pop(); entry; entry = toVisit.pop()) {
    if (found.has(entry.id)) continue
    found.set(entry.id, entry)
    toVisit.push(...(await addendaOf(services.db, entry.id)).filter(({ state }) => state === 'sealed'))
  }
  return [...found.values()]
}

/**
 * Which entries a bundle holds and which it names as left out, all as of its head: the chosen ones that were rendered, the
 * chosen ones that were not yet, addenda whose seal the chains tell of, and what an addendum amends.
 */
export async function choose(services: Services, chosen: readonly EntryRow[]): Promise<Chosen> {
  const entries: ChosenEntry[] = []
  let treeSize = 0
  for (const entry of await withAddenda(services, chosen)) {
    const events = await eventsOfEntry(services, entry)
    const rendered = events.find(({ action }) => action === 'entry.rendered')
    if (!rendered) continue
    treeSize = Math.max(treeSize, rendered.sequence)
    entries.push({ entry, events })
  }
  const included = new Set(entries.map(({ entry }) => entry.id))
  const leftOut = new Map<string, LeftOutEntry>()
  const leave = (
    entry: Pick<EntryRow, 'id' | 'notebookNumber' | 'serial'>,
    reason: LeftOutEntry['reason'],
  ) => {
    if (!included.has(entry.id) && !leftOut.has(entry.id))
      leftOut.set(entry.id, { kind: 'entry', id: entry.id, number: entryNumber(entry), reason })
  }
  for (const { entry } of entries) {
    const amended = entry.amendsEntryId === null ? null : await findEntry(services.db, entry.amendsEntryId)
    if (amended) leave(amended, 'not-chosen')
  }
  for (const entry of chosen) if (await createdBy(services, entry, treeSize)) leave(entry, 'not-sealed')
  for (const id of amendments(entries, treeSize)) {
    const addendum = await findEntry(services.db, id)
    if (addendum) leave(addendum, 'not-sealed')
  }
  return { entries, leftOut: [...leftOut.values()], treeSize }
}

async function eventsOfEntry(services: Services, entry: EntryRow): Promise<LedgerEvent[]> {
  const runs = await runsOfEntry(services.db, entry.id)
  return eventsOf(services, [
    { kind: 'entry', id: entry.id },
    ...runs.map(({ id }) => ({ kind: 'run', id }) as const),
  ])
}

async function createdBy(services: Services, entry: EntryRow, treeSize: number): Promise<boolean> {
  const [first] = await eventsOf(services, [{ kind: 'entry', id: entry.id }])
  return first !== undefined && first.sequence <= treeSize
}

/** Ids of addenda of which the chains tell up to the head. */
function amendments(entries: readonly ChosenEntry[], treeSize: number): string[] {
  return entries
    .flatMap(({ events }) => events)
    .filter(({ sequence }) => sequence <= treeSize)
    .flatMap((event) => payloadOf(event, 'entry.amended')?.byEntryId ?? [])
}

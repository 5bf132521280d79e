export { requireEntry, requireLockedEntry, requireOpen, requireWritableEntry } from './access.ts'
export {
  addendaOf,
  entriesOfNotebook,
  entriesOfPerson,
  entryNumber,
  findEntry,
  hasContributed,
  lockEntry,
  updateEntry,
  waitingCount,
  type EntryRow,
} from './repository.ts'
export {
  contentOfSave,
  revisionsOf,
  writersOf,
  writtenBetween,
  type Document,
  type Revision,
} from './saves-repository.ts'
export { changeEntry } from './use-cases/change-entry.ts'
export { createEntry, createEntryIn } from './use-cases/create-entry.ts'
export { cutRevision } from './use-cases/cut-revision.ts'
export { saveContent } from './use-cases/save-content.ts'
export { contentRoutes } from './routes.ts'
export { noteOpening, openingsOf } from './openings.ts'
export { dateInZone } from './work-date.ts'

import type { Entry } from '../../../server/contract/entries.ts'
import type { RawFile } from '../../../server/contract/files.ts'

/** Files of the entry and of its runs, each once: all that a signature binds. */
export function filesToSign(entry: Pick<Entry, 'files' | 'runs'>): RawFile[] {
  const all = [...entry.files, ...entry.runs.flatMap((run) => run.files)]
  return [...new Map(all.map((file) => [file.id, file])).values()]
}

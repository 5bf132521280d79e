import type { EntrySummary } from '../../../server/contract/entries.ts'
import { nearTime } from '../../lib/times.ts'
import { TextLink } from '../../ui/button.tsx'
import { StateGlyph } from '../../ui/state-glyph.tsx'
import { Table } from '../../ui/table.tsx'
import { authorsInWords, glyphOf, sheetNumber } from './entry-state.ts'
import { experimentNames } from './experiments.ts'

/** Sheets of a notebook. */
export function EntryTable({ entries, pathOf }: { entries: EntrySummary[]; pathOf: (id: string) => string }) {
  return (
    <Table
      label="Sheets"
      rows={entries}
      keyOf={(entry) => entry.id}
      stackable
      columns={[
        {
          head: 'Sheet',
          nowrap: true,
          cell: (entry) => <span className="hs-fig">{sheetNumber(entry.number)}</span>,
        },
        {
          head: 'Title',
          heads: true,
          cell: (entry) => <TextLink to={pathOf(entry.id)}>{entry.title}</TextLink>,
        },
        {
          head: 'Experiment',
          deskOnly: true,
          nowrap: true,
          cell: (entry) => experimentNames[entry.experiment],
        },
        { head: 'Written by', deskOnly: true, cell: (entry) => authorsInWords(entry.authors) },
        { head: 'State', nowrap: true, cell: (entry) => <StateGlyph state={glyphOf(entry.phase)} /> },
        {
          head: 'Changed',
          nowrap: true,
          cell: (entry) => <span className="hs-quiet">{nearTime(entry.updatedAt)}</span>,
        },
      ]}
    />
  )
}

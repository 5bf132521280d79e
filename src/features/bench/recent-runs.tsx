import type { ReactNode } from 'react'
import type { Run } from '../../../server/contract/runs.ts'
import { durationText } from '../../lib/picoseconds.ts'
import { nearTime } from '../../lib/times.ts'
import { TextLink } from '../../ui/button.tsx'
import { Table } from '../../ui/table.tsx'

export interface ShownRun {
  run: Run
  experiment: string
  sheet: { id: string; number: string } | null
  /** The figure that the run is remembered by. */
  result: ReactNode
  preview: ReactNode
}

/** The latest runs with what came out of them. */
export function RecentRuns({ runs, pathOf }: { runs: ShownRun[]; pathOf: (entryId: string) => string }) {
  return (
    <Table
      label="Recent runs"
      rows={runs}
      keyOf={({ run }) => run.id}
      stackable
      columns={[
        {
          head: 'Run',
          heads: true,
          nowrap: true,
          cell: ({ run }) => <span className="hs-fig">{run.number}</span>,
        },
        {
          head: 'Started',
          nowrap: true,
          deskOnly: true,
          cell: ({ run }) => <span className="hs-quiet">{nearTime(run.startedAt)}</span>,
        },
        { head: 'Experiment', deskOnly: true, nowrap: true, cell: ({ experiment }) => experiment },
        { head: 'Duration', figure: true, cell: ({ run }) => durationOf(run) },
        { head: 'Preview', cell: ({ preview }) => preview },
        { head: 'Key result', nowrap: true, cell: ({ result }) => result },
        {
          head: 'Sheet',
          nowrap: true,
          cell: ({ sheet }) =>
            sheet ? (
              <TextLink className="hs-fig" to={pathOf(sheet.id)}>
                {sheet.number}
              </TextLink>
            ) : (
              <span className="hs-quiet">not filed</span>
            ),
        },
      ]}
    />
  )
}

/** As declared for the run, else as found in its first record. */
function durationOf(run: Run): string {
  const ps = run.durationPs ?? run.files.find((file) => file.reading.durationPs !== null)?.reading.durationPs
  return ps === null || ps === undefined ? '' : durationText(ps)
}

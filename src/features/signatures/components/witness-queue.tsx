import { nearTime } from '../../../lib/times.ts'
import { TextLink } from '../../../ui/button.tsx'
import { StateGlyph } from '../../../ui/state-glyph.tsx'
import { Table, type Column } from '../../../ui/table.tsx'
import { WaitingScale } from '../../../ui/waiting-scale.tsx'
import type { DeskEntry } from '../queries.ts'
import { daysSince, dueDays, overdueDays } from '../waiting.ts'

/** On a phone each row becomes lines, the age first. */
const asLines = 'max-[700px]:[&_tr]:grid-cols-1'

/** Sheets that wait for a witness, oldest first, each with its age on the scale of fourteen days. */
export function WitnessQueue({
  entries,
  now,
  selected,
  onSelect,
}: {
  entries: DeskEntry[]
  now: Date
  selected: string | null
  onSelect: (id: string) => void
}) {
  const columns: Column<DeskEntry>[] = [
    {
      head: 'Waiting / days',
      cell: (entry) => <Waiting since={entry.submittedAt ?? entry.updatedAt} now={now} />,
    },
    {
      head: 'Sheet',
      cell: (entry) => <SheetCell entry={entry} selected={selected === entry.id} onSelect={onSelect} />,
    },
    { head: 'Author', cell: authorsOf },
    {
      head: 'Notebook',
      cell: (entry) => `${entry.number.split('/')[0]} ${entry.notebookTitle}`,
      deskOnly: true,
    },
    {
      head: 'Submitted',
      cell: (entry) => entry.submittedAt && nearTime(entry.submittedAt, now),
      nowrap: true,
      deskOnly: true,
    },
  ]
  return (
    <div className={asLines}>
      <Table
        label="Sheets that wait for you"
        columns={columns}
        rows={oldestFirst(entries)}
        keyOf={(entry) => entry.id}
        selected={selected ?? undefined}
        stackable
      />
    </div>
  )
}

export function oldestFirst(entries: DeskEntry[]): DeskEntry[] {
  return [...entries].sort((a, b) => (a.submittedAt ?? '').localeCompare(b.submittedAt ?? ''))
}

export function authorsOf(entry: Pick<DeskEntry, 'authors'>): string {
  const [first, ...others] = entry.authors.map((author) => author.name)
  return others.length === 0 ? (first ?? '') : `${first}, with ${others.join(', ')}`
}

function Waiting({ since, now }: { since: string; now: Date }) {
  const days = daysSince(since, now)
  return (
    <>
      <WaitingScale waited={days} limit={dueDays} />
      {days > overdueDays && <StateGlyph state="fault">Overdue</StateGlyph>}
    </>
  )
}

function SheetCell({
  entry,
  selected,
  onSelect,
}: {
  entry: DeskEntry
  selected: boolean
  onSelect: (id: string) => void
}) {
  return (
    <>
      <TextLink className="hs-fig" to={`/entries/${entry.id}/review`}>
        {entry.number}
      </TextLink>
      {entry.important && <span className="hs-quiet text-1"> important</span>}
      <button
        type="button"
        className="block min-h-6 w-full cursor-pointer text-left"
        aria-pressed={selected}
        aria-label={`Show ${entry.number}, ${entry.title}, in the margin`}
        onClick={() => onSelect(entry.id)}
      >
        {entry.title}
      </button>
    </>
  )
}

/** Sheets in other hands: returned to their authors, or sealed. */
export function OtherSheets({ label, entries, now }: { label: string; entries: DeskEntry[]; now: Date }) {
  const columns: Column<DeskEntry>[] = [
    {
      head: 'Sheet',
      cell: (entry) => (
        <>
          <TextLink className="hs-fig" to={`/entries/${entry.id}`}>
            {entry.number}
          </TextLink>
          <span className="block">{entry.title}</span>
        </>
      ),
    },
    { head: 'Author', cell: authorsOf },
    {
      head: 'Notebook',
      cell: (entry) => `${entry.number.split('/')[0]} ${entry.notebookTitle}`,
      deskOnly: true,
    },
    { head: 'Last change', cell: (entry) => nearTime(entry.updatedAt, now), nowrap: true },
    {
      head: 'Standing',
      cell: (entry) => <StateGlyph state={entry.phase === 'sealed' ? 'sealed' : 'returned'} />,
      nowrap: true,
    },
  ]
  return (
    <div className={asLines}>
      <Table label={label} columns={columns} rows={entries} keyOf={(entry) => entry.id} stackable />
    </div>
  )
}

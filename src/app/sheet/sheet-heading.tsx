import type { Entry } from '../../../server/contract/entries.ts'
import type { Notebook } from '../../../server/contract/notebooks.ts'
import { authorsInWords } from '../../features/entries/entry-state.ts'
import { experimentNames } from '../../features/entries/experiments.ts'
import { SheetTitle } from '../../features/entries/sheet-title.tsx'
import { dateAndTime, longDate } from '../../lib/times.ts'
import { TextLink } from '../../ui/button.tsx'
import { Facts, SheetHead } from '../../ui/sheet.tsx'
import { entryPath } from '../paths.ts'

interface SheetHeadingProps {
  entry: Entry
  notebook: Notebook
  editable: boolean
}

/** Title, number, authors, dates; who can witness. */
export function SheetHeading({ entry, notebook, editable }: SheetHeadingProps) {
  const { amends, amendedBy } = entry
  const witnesses = notebook.members
    .filter(
      (member) =>
        member.role === 'supervisor' && !entry.authors.some((author) => author.personId === member.personId),
    )
    .map((member) => member.name)
  return (
    <SheetHead
      title={<SheetTitle entryId={entry.id} title={entry.title} editable={editable} />}
      meta={[
        <>
          Sheet <span className="hs-fig">{entry.number}</span>
        </>,
        authorsInWords(entry.authors),
        `begun ${dateAndTime(entry.createdAt)}`,
        ...(amends
          ? [<AmendsLink key="amends" words="Amends" entryId={amends.entryId} number={amends.number} />]
          : []),
        ...amendedBy.map((by) => <AmendsLink key={by.entryId} words="Amended by" {...by} />),
      ]}
      facts={
        <Facts
          facts={[
            { name: 'Experiment', value: experimentNames[entry.experiment], words: true },
            { name: 'Measured', value: longDate(entry.runAt), words: true },
            { name: 'Witness', value: witnesses.join(', ') || 'nobody in this notebook yet', words: true },
          ]}
        />
      }
    />
  )
}

function AmendsLink({ words, entryId, number }: { words: string; entryId: string; number: string }) {
  return (
    <>
      {words} <TextLink to={entryPath(entryId)}>{number}</TextLink>
    </>
  )
}

import { useSuspenseQuery } from '@tanstack/react-query'
import { useParams, type LoaderFunctionArgs } from 'react-router-dom'
import type { EntrySummary } from '../../../server/contract/entries.ts'
import type { Notebook } from '../../../server/contract/notebooks.ts'
import { EntryTable } from '../../features/entries/entry-table.tsx'
import { entriesOfNotebookQuery } from '../../features/entries/queries.ts'
import { Members } from '../../features/notebooks/members.tsx'
import '../../features/notebooks/notebooks.css'
import { notebookQuery } from '../../features/notebooks/queries.ts'
import { longDate } from '../../lib/times.ts'
import { ClosedSetUp } from '../../plots/beam-path/beam-path.tsx'
import { TextLink } from '../../ui/button.tsx'
import { EmptyState } from '../../ui/empty-state.tsx'
import { Crumbs, Ground } from '../../ui/ground.tsx'
import { Columns, Section, Sheet } from '../../ui/sheet.tsx'
import { queryClient } from '../client.ts'
import { entryPath, paths } from '../paths.ts'
import { BlankSheetButton, StartSection, Templates, useStartHere } from '../start-here.tsx'
import { useTitle } from '../use-title.ts'

export async function loader({ params }: LoaderFunctionArgs) {
  const id = params.notebookId!
  await Promise.all([
    queryClient.ensureQueryData(notebookQuery(id)),
    queryClient.ensureQueryData(entriesOfNotebookQuery(id)),
  ])
  return null
}

/** A notebook: its sheets, its people, and a new sheet. */
export function Component() {
  const { notebookId } = useParams()
  const { data: notebook } = useSuspenseQuery(notebookQuery(notebookId!))
  const { data: entries } = useSuspenseQuery(entriesOfNotebookQuery(notebookId!))
  useTitle(`${notebook.number} ${notebook.title}`)
  const empty = entries.items.length === 0
  return (
    <Ground holes={empty}>
      <Crumbs
        path={[
          <TextLink key="all" to={paths.notebooks} className={empty ? 'hs-plate' : undefined}>
            Notebooks
          </TextLink>,
          <b key="this" className={empty ? 'hs-plate' : undefined} aria-current="page">
            {notebook.number} {notebook.title}
          </b>,
        ]}
        beside={
          <span className={empty ? 'hs-plate hs-quiet' : 'hs-quiet'}>
            begun {longDate(notebook.createdAt)}, kept by {keeperOf(notebook)}
          </span>
        }
      />
      {empty ? <Empty notebook={notebook} /> : <Filled notebook={notebook} entries={entries.items} />}
    </Ground>
  )
}

const keeperOf = (notebook: Notebook) => notebook.members.find((member) => member.keeper)?.name ?? 'nobody'

function Filled({ notebook, entries }: { notebook: Notebook; entries: EntrySummary[] }) {
  const here = useStartHere([notebook])
  return (
    <Sheet>
      <Columns
        label="New sheets and people"
        margin={
          <>
            {here.possible && <StartSection here={here} />}
            <Section title="People" count={notebook.members.length}>
              <Members notebook={notebook} />
            </Section>
          </>
        }
      >
        <Section title={notebook.title} count={entries.length}>
          <EntryTable entries={entries} pathOf={entryPath} />
        </Section>
      </Columns>
      {here.dialog}
    </Sheet>
  )
}

function Empty({ notebook }: { notebook: Notebook }) {
  const here = useStartHere([notebook])
  return (
    <>
      <EmptyState
        picture={<ClosedSetUp variant="hbt" />}
        title="No sheets in this notebook yet"
        templates={here.possible && <Templates here={here} withAbout />}
        actions={here.possible && <BlankSheetButton here={here} />}
      >
        A sheet holds one piece of work: what you set out to do, the runs, the calculations and the
        signatures.
        {here.possible && ' Pick the experiment that is on the table; its beam path comes with it.'}
      </EmptyState>
      <section className="hs-sheet hs-empty" aria-label="People">
        <Section title="People" count={notebook.members.length}>
          <Members notebook={notebook} />
        </Section>
      </section>
      {here.dialog}
    </>
  )
}

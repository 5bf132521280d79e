import { useSuspenseQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { useNavigate } from 'react-router-dom'
import { NewNotebook } from '../../features/notebooks/new-notebook.tsx'
import { NotebookTable } from '../../features/notebooks/notebook-table.tsx'
import { notebooksQuery } from '../../features/notebooks/queries.ts'
import { sessionQuery } from '../../features/sign-in/queries.ts'
import { ClosedSetUp } from '../../plots/beam-path/beam-path.tsx'
import { Button } from '../../ui/button.tsx'
import { EmptyState } from '../../ui/empty-state.tsx'
import { Ground, PageHead } from '../../ui/ground.tsx'
import { Sheet } from '../../ui/sheet.tsx'
import { queryClient } from '../client.ts'
import { notebookPath } from '../paths.ts'
import { useTitle } from '../use-title.ts'

export const loader = () => queryClient.ensureQueryData(notebooksQuery)

/** Notebooks the person may read. */
export function Component() {
  useTitle('Notebooks')
  const { data: notebooks } = useSuspenseQuery(notebooksQuery)
  const { data: session } = useSuspenseQuery(sessionQuery)
  const [creating, setCreating] = useState(false)
  const navigate = useNavigate()
  const mayCreate = session.roles.some((role) => role !== 'auditor')
  const create = mayCreate && (
    <Button icon="plus" onClick={() => setCreating(true)}>
      New notebook
    </Button>
  )
  const empty = notebooks.items.length === 0
  return (
    <Ground holes={empty}>
      {empty ? (
        <EmptyState picture={<ClosedSetUp variant="hbt" />} title="No notebooks yet" actions={create}>
          A notebook holds the sheets of one piece of research. Those that you write, witness or read in
          appear here.
        </EmptyState>
      ) : (
        <>
          <PageHead title="Notebooks" about={`${notebooks.items.length} that you can read`}>
            {create}
          </PageHead>
          <Sheet className="hs-page-sheet">
            <NotebookTable notebooks={notebooks.items} personId={session.person.id} pathOf={notebookPath} />
          </Sheet>
        </>
      )}
      {creating && (
        <NewNotebook onClose={() => setCreating(false)} onCreated={(id) => void navigate(notebookPath(id))} />
      )}
    </Ground>
  )
}

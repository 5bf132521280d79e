import { useSuspenseQuery } from '@tanstack/react-query'
import { useLoaderData, useParams, type LoaderFunctionArgs } from 'react-router-dom'
import { entriesOfNotebookQuery, entryQuery, fetchContent } from '../../features/entries/queries.ts'
import { notebookQuery } from '../../features/notebooks/queries.ts'
import { sessionQuery } from '../../features/sign-in/queries.ts'
import { queryClient } from '../client.ts'
import { SheetPage } from '../sheet/sheet-page.tsx'
import { useOpenEntry } from '../sheet/use-open-entry.ts'
import { useTitle } from '../use-title.ts'

export async function loader({ params }: LoaderFunctionArgs) {
  const id = params.entryId!
  const [entry, content] = await Promise.all([queryClient.fetchQuery(entryQuery(id)), fetchContent(id)])
  await Promise.all([
    queryClient.ensureQueryData(notebookQuery(entry.notebookId)),
    queryClient.ensureQueryData(entriesOfNotebookQuery(entry.notebookId)),
  ])
  return content
}

/** A sheet, opened: every sheet is a page of its own, so that no state of one can reach another. */
export function Component() {
  const { entryId } = useParams()
  return <OpenSheet key={entryId} entryId={entryId!} />
}

function OpenSheet({ entryId }: { entryId: string }) {
  const content = useLoaderData() as Awaited<ReturnType<typeof loader>>
  const entry = useOpenEntry(entryId)
  const { data: notebook } = useSuspenseQuery(notebookQuery(entry.notebookId))
  const { data: entries } = useSuspenseQuery(entriesOfNotebookQuery(entry.notebookId))
  const { data: session } = useSuspenseQuery(sessionQuery)
  useTitle(`${entry.number} ${entry.title}`)
  return <SheetPage {...{ entry, notebook, session, content }} entries={entries.items} />
}

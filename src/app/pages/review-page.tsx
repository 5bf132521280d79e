import { useQuery, useSuspenseQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { useLoaderData, useParams, type LoaderFunctionArgs } from 'react-router-dom'
import { entryQuery, fetchContent } from '../../features/entries/queries.ts'
import { notebookQuery } from '../../features/notebooks/queries.ts'
import { sessionQuery } from '../../features/sign-in/queries.ts'
import { oldestFirst, ReviewPanel, witnessQueueQuery } from '../../features/signatures/index.ts'
import { ButtonLink, TextLink } from '../../ui/button.tsx'
import { Ground } from '../../ui/ground.tsx'
import { queryClient } from '../client.ts'
import { paths, reviewPath } from '../paths.ts'
import { ReviewCrumbs } from '../review/review-crumbs.tsx'
import { ReviewSheet } from '../review/review-sheet.tsx'
import { useOpenEntry } from '../sheet/use-open-entry.ts'
import { useTitle } from '../use-title.ts'

export async function loader({ params }: LoaderFunctionArgs) {
  const id = params.entryId!
  const [entry, content] = await Promise.all([queryClient.fetchQuery(entryQuery(id)), fetchContent(id)])
  await queryClient.ensureQueryData(notebookQuery(entry.notebookId))
  return content
}

/** A submitted sheet before its witness; each sheet is a page of its own. */
export function Component() {
  const { entryId } = useParams()
  return <Review key={entryId} entryId={entryId!} />
}

type Outcome = 'countersigned' | 'returned'

function Review({ entryId }: { entryId: string }) {
  const content = useLoaderData() as Awaited<ReturnType<typeof loader>>
  const entry = useOpenEntry(entryId)
  const { data: notebook } = useSuspenseQuery(notebookQuery(entry.notebookId))
  const { data: session } = useSuspenseQuery(sessionQuery)
  const { data: waiting = [] } = useQuery(witnessQueueQuery)
  const [outcome, setOutcome] = useState<Outcome | null>(null)
  const [now] = useState(() => new Date())
  const queue = oldestFirst(waiting)
  useTitle(`Review ${entry.number}`)
  return (
    <Ground>
      <ReviewCrumbs entry={entry} queue={queue} />
      <div className="grid items-start gap-6 wide:grid-cols-[minmax(0,1fr)_368px]">
        <ReviewSheet
          entry={entry}
          notebook={notebook}
          content={content.document}
          justSealed={outcome === 'countersigned' && entry.phase === 'sealed'}
        />
        <div className="wide:sticky wide:top-6">
          <ReviewPanel
            sheet={{
              entry,
              me: { id: session.person.id, name: session.person.name },
              laboratoryId: session.laboratory.id,
              shownContent: () => content.document,
            }}
            zone={session.laboratory.zone}
            textOpened
            now={now}
            onSigned={() => setOutcome('countersigned')}
            onReturned={() => setOutcome('returned')}
          />
          {outcome && (
            <Onward outcome={outcome} next={queue.find((each) => each.id !== entryId)?.id ?? null} />
          )}
        </div>
      </div>
    </Ground>
  )
}

function Onward({ outcome, next }: { outcome: Outcome; next: string | null }) {
  return (
    <div className="mt-4" role="status">
      <p>{outcome === 'countersigned' ? 'Countersigned.' : 'Returned to its author.'}</p>
      <div className="hs-actions mt-2">
        {next && (
          <ButtonLink kind="primary" to={reviewPath(next)}>
            Next sheet
          </ButtonLink>
        )}
        <TextLink to={paths.witness}>Witness desk</TextLink>
      </div>
    </div>
  )
}

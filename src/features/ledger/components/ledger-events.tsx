import { useInfiniteQuery, useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { sentenceOf } from '../../../lib/api-problem.ts'
import { Button } from '../../../ui/button.tsx'
import { Message } from '../../../ui/message.tsx'
import { OptionRow } from '../../../ui/option-row.tsx'
import { eventFilters, type EventFilterName } from '../event-words.ts'
import { eventsQuery, headQuery, verificationQuery } from '../queries.ts'
import { EventChain } from './event-chain.tsx'

export interface SubjectFilter {
  id: string
  name: string
}

/** The chain with its filters. A subject given by the page narrows it to one entry, key or person. */
export function LedgerEvents({
  subject,
  onSubject,
}: {
  subject: SubjectFilter | null
  onSubject: (subject: SubjectFilter | null) => void
}) {
  const [filter, setFilter] = useState<EventFilterName>('all')
  const action = eventFilters.find((each) => each.value === filter)?.action
  const events = useInfiniteQuery(eventsQuery({ action, subject: subject?.id }))
  const head = useQuery(headQuery)
  const verification = useQuery({ ...verificationQuery, enabled: false })
  const shown = events.data?.pages.flatMap((page) => page.items) ?? []
  return (
    <section className="mt-6" aria-label="Events">
      <div className="hs-filters">
        <OptionRow label="Kinds of event" options={[...eventFilters]} value={filter} onChange={setFilter} />
        {subject && (
          <span className="hs-filters-end">
            <Button size="small" icon="cross" onClick={() => onSubject(null)}>
              Only {subject.name}
            </Button>
          </span>
        )}
      </div>
      {events.error && (
        <Message kind="warn" title="The events could not be read.">
          {sentenceOf(events.error)}
        </Message>
      )}
      {events.data && shown.length === 0 && <p className="hs-quiet">No such event.</p>}
      {shown.length > 0 && (
        <EventChain
          events={shown}
          verification={verification.data}
          head={head.data?.head ?? null}
          onSubject={onSubject}
        />
      )}
      {events.hasNextPage && (
        <div className="mt-3">
          <Button busy={events.isFetchingNextPage} onClick={() => void events.fetchNextPage()}>
            {events.isFetchingNextPage ? 'Fetching' : 'Earlier events'}
          </Button>
        </div>
      )}
    </section>
  )
}

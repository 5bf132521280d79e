import { useQuery, useSuspenseQuery } from '@tanstack/react-query'
import { useState } from 'react'
import {
  deskSentence,
  DeskMargin,
  oldestFirst,
  OtherSheets,
  readableEntriesQuery,
  witnessQueueQuery,
  WitnessQueue,
} from '../../features/signatures/index.ts'
import { Ground, PageHead } from '../../ui/ground.tsx'
import { OptionRow } from '../../ui/option-row.tsx'
import { Columns, Sheet } from '../../ui/sheet.tsx'
import { queryClient } from '../client.ts'
import { useTitle } from '../use-title.ts'

export const loader = () => queryClient.ensureQueryData(witnessQueueQuery)

type Which = 'mine' | 'returned' | 'sealed'

/** What waits for a witness and for how long; beside it the sheet that was chosen, at first the oldest. */
export function Component() {
  useTitle('Witness desk')
  const { data: queue } = useSuspenseQuery(witnessQueueQuery)
  const { data: readable = [] } = useQuery(readableEntriesQuery)
  const [which, setWhich] = useState<Which>('mine')
  const [chosen, setChosen] = useState<string | null>(null)
  const [now] = useState(() => new Date())
  const returned = readable.filter((entry) => entry.phase === 'returned')
  const sealed = readable.filter((entry) => entry.phase === 'sealed')
  const beside = queue.find((entry) => entry.id === chosen) ?? oldestFirst(queue)[0]
  const submitted = queue.flatMap((entry) => entry.submittedAt ?? [])
  return (
    <Ground>
      <PageHead title="Witness desk" about={deskSentence(submitted, now)} />
      <Sheet>
        <Columns
          label="The chosen sheet"
          margin={beside ? <DeskMargin entryId={beside.id} /> : <NothingWaits />}
        >
          <div className="hs-filters">
            <OptionRow
              label="Show"
              options={[
                { value: 'mine', label: 'For me', count: queue.length },
                { value: 'returned', label: 'With authors', count: returned.length },
                { value: 'sealed', label: 'Sealed', count: sealed.length },
              ]}
              value={which}
              onChange={setWhich}
            />
          </div>
          {which === 'mine' && queue.length > 0 && (
            <WitnessQueue entries={queue} now={now} selected={beside?.id ?? null} onSelect={setChosen} />
          )}
          {which === 'mine' && queue.length === 0 && (
            <p>
              A sheet comes here when all its authors have signed it, and stays until it is countersigned or
              returned.
            </p>
          )}
          {which === 'returned' && <Others label="Sheets with their authors" entries={returned} now={now} />}
          {which === 'sealed' && <Others label="Sealed sheets" entries={sealed} now={now} />}
        </Columns>
      </Sheet>
    </Ground>
  )
}

function Others(props: Parameters<typeof OtherSheets>[0]) {
  if (props.entries.length === 0) return <p className="hs-quiet">None among the latest 200 sheets.</p>
  return <OtherSheets {...props} />
}

function NothingWaits() {
  return <p className="hs-quiet">Choose a sheet in the queue to see here what it holds.</p>
}

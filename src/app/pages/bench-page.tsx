import { useQuery, useSuspenseQuery } from '@tanstack/react-query'
import { NeedsList } from '../../features/bench/needs-list.tsx'
import { needsOf } from '../../features/bench/needs.ts'
import { OpenSheets } from '../../features/bench/open-sheets.tsx'
import { RecentRuns } from '../../features/bench/recent-runs.tsx'
import '../../features/bench/bench.css'
import { glyphOf } from '../../features/entries/entry-state.ts'
import { myEntriesQuery } from '../../features/entries/queries.ts'
import { notebooksQuery } from '../../features/notebooks/queries.ts'
import { sessionQuery } from '../../features/sign-in/queries.ts'
import { clockTime, longDate, zoneInWords } from '../../lib/times.ts'
import { Ground, PageHead } from '../../ui/ground.tsx'
import { Columns, Section, Sheet } from '../../ui/sheet.tsx'
import { OnTheBench } from '../bench/on-the-bench.tsx'
import { RunningCalculations } from '../bench/running-calculations.tsx'
import { useBenchEntries } from '../bench/use-bench-entries.ts'
import { useRecentRuns } from '../bench/use-recent-runs.tsx'
import { queryClient } from '../client.ts'
import { entryPath, reviewPath } from '../paths.ts'
import { StartSection, useStartHere } from '../start-here.tsx'
import { useTitle } from '../use-title.ts'

export async function loader() {
  await Promise.all([
    queryClient.ensureQueryData(notebooksQuery),
    queryClient.ensureQueryData(myEntriesQuery('all')),
    queryClient.ensureQueryData(myEntriesQuery('mine')),
    queryClient.ensureQueryData(myEntriesQuery('waiting')),
  ])
  return null
}

/** What needs me, what came out last, and where to begin. */
export function Component() {
  useTitle('Bench')
  const { data: session } = useSuspenseQuery(sessionQuery)
  const { data: notebooks } = useSuspenseQuery(notebooksQuery)
  const { data: waiting } = useSuspenseQuery(myEntriesQuery('waiting'))
  const { data: mine } = useSuspenseQuery(myEntriesQuery('mine'))
  const { data: all } = useQuery(myEntriesQuery('all'))
  const own = useBenchEntries(mine.items)
  const here = useStartHere(notebooks.items)
  const needs = needsOf(own, waiting.items, session.person.id)
  const runs = useRecentRuns(notebooks.items, all?.items ?? [])
  const open = mine.items.filter((entry) => entry.state !== 'sealed' && entry.state !== 'withdrawn')
  const now = new Date()
  return (
    <Ground holes>
      <PageHead
        plate
        title="Bench"
        about={`${longDate(now)}, ${clockTime(now)} (${zoneInWords(now)}). ${session.laboratory.name}`}
      />
      <OnTheBench entry={runs[0]?.entry} run={runs[0]?.run} />
      <Sheet>
        <Columns
          label="Start and go on"
          margin={
            <>
              {here.possible && <StartSection here={here} />}
              <Section title="Open sheets" count={open.length}>
                <OpenSheets entries={open.slice(0, 6)} glyphOf={glyphOf} pathOf={entryPath} />
              </Section>
              <RunningCalculations entries={own} />
            </>
          }
        >
          <Section title="Needs you" count={needs.length}>
            <NeedsList
              needs={needs}
              pathOf={({ entryId, place }) => (place === 'review' ? reviewPath(entryId) : entryPath(entryId))}
            />
          </Section>
          {runs.length > 0 && (
            <Section title="Recent runs">
              <RecentRuns runs={runs} pathOf={entryPath} />
            </Section>
          )}
        </Columns>
      </Sheet>
      {here.dialog}
    </Ground>
  )
}

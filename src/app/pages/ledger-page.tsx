import { useSuspenseQuery } from '@tanstack/react-query'
import { useSearchParams } from 'react-router-dom'
import { ExportForm, ExportList } from '../../features/exports/index.ts'
import {
  AnchorsSection,
  HeadSection,
  LedgerEvents,
  VerificationResult,
  type SubjectFilter,
} from '../../features/ledger/index.ts'
import { sessionQuery } from '../../features/sign-in/queries.ts'
import { Ground, PageHead } from '../../ui/ground.tsx'
import { Columns, Section, Sheet } from '../../ui/sheet.tsx'
import { useTitle } from '../use-title.ts'

/** The chain of events and what can be proved with it; beside it bundles, the newest head and the anchors. */
export function Component() {
  useTitle('Ledger')
  const { data: session } = useSuspenseQuery(sessionQuery)
  const seesAll = session.roles.some((role) => role === 'auditor' || role === 'manager')
  const [search, setSearch] = useSearchParams()
  const id = search.get('subject')
  const subject: SubjectFilter | null = id === null ? null : { id, name: search.get('name') ?? 'one subject' }
  const chooseSubject = (chosen: SubjectFilter | null) =>
    setSearch(chosen ? { subject: chosen.id, name: chosen.name } : {}, { replace: true })
  return (
    <Ground>
      <PageHead
        title="Ledger"
        about="Every signature and seal in the laboratory, each event bound to the one before it."
      />
      <Sheet>
        <Columns
          label="Exports, head and anchors"
          margin={
            <>
              <Section title="Export">
                <ExportForm />
              </Section>
              <ExportList />
              <HeadSection />
              <AnchorsSection />
            </>
          }
        >
          <VerificationResult />
          <LedgerEvents subject={subject} onSubject={chooseSubject} />
          {!seesAll && (
            <p className="hs-quiet mt-4">
              You see the events of notebooks that you may read, and your own. Auditors and managers see all;
              the check above is over all in any case.
            </p>
          )}
        </Columns>
      </Sheet>
    </Ground>
  )
}

import { useSuspenseQuery } from '@tanstack/react-query'
import type { Person } from '../../../server/contract/people.ts'
import { PeopleTable, peopleQuery } from '../../features/people/index.ts'
import { sessionQuery } from '../../features/sign-in/queries.ts'
import { EndorseAct, keyStanding } from '../../features/signatures/index.ts'
import { TextLink } from '../../ui/button.tsx'
import { Ground, PageHead } from '../../ui/ground.tsx'
import { Columns, Facts, Section, Sheet } from '../../ui/sheet.tsx'
import { queryClient } from '../client.ts'
import { paths } from '../paths.ts'
import { useTitle } from '../use-title.ts'

export const loader = () => queryClient.ensureQueryData(peopleQuery)

/** Who belongs to the laboratory, in which roles, and whose key waits for an endorsement. */
export function Component() {
  useTitle('People')
  const { data: session } = useSuspenseQuery(sessionQuery)
  const { data: people } = useSuspenseQuery(peopleQuery)
  const mayEndorse = session.roles.includes('manager') || session.roles.includes('supervisor')
  const waiting = people.items.filter((person) => person.signingKey === 'awaiting-endorsement')
  const act = (person: Person) => {
    if (person.id === session.person.id) return <TextLink to={paths.keys}>My signing key</TextLink>
    if (person.signingKey === 'none' || !person.active || !mayEndorse) return null
    return <EndorseAct person={person} me={session.person} laboratory={session.laboratory} />
  }
  return (
    <Ground>
      <PageHead title="People" about={`Of ${session.laboratory.name}`} />
      <Sheet>
        <Columns label="About keys" margin={<KeysMargin waiting={waiting} mayEndorse={mayEndorse} />}>
          <PeopleTable people={people.items} standing={keyStanding} act={act} />
        </Columns>
      </Sheet>
    </Ground>
  )
}

function KeysMargin({ waiting, mayEndorse }: { waiting: Person[]; mayEndorse: boolean }) {
  return (
    <>
      <Section title="Endorsing a key">
        <p>
          A key signs only after a manager or a supervisor, never its owner, has checked who the person is,
          compared the digits of the key and signed that. Both signatures are in every bundle.
        </p>
        {waiting.length > 0 && (
          <p className="mt-2">
            {waiting.map((person) => person.name).join(', ')} {waiting.length === 1 ? 'waits' : 'wait'} for
            it.
            {!mayEndorse && ' You cannot endorse; ask a manager or a supervisor.'}
          </p>
        )}
      </Section>
      <Section title="Roles">
        <Facts
          facts={[
            { name: 'Experimentalist', value: 'writes and signs', words: true },
            { name: 'Supervisor', value: 'writes, signs, witnesses', words: true },
            { name: 'Auditor', value: 'reads, verifies, exports', words: true },
            { name: 'Manager', value: 'people and roles; neither writes nor witnesses', words: true },
          ]}
        />
      </Section>
    </>
  )
}

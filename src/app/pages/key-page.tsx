import { useSuspenseQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { sessionQuery } from '../../features/sign-in/queries.ts'
import {
  EnrolForm,
  KeyStanding,
  signingKeyQuery,
  WaitingSuccessor,
  WhatAPageCannotPrevent,
} from '../../features/signatures/index.ts'
import { Button } from '../../ui/button.tsx'
import { Ground, PageHead } from '../../ui/ground.tsx'
import { Columns, Section, Sheet } from '../../ui/sheet.tsx'
import { queryClient } from '../client.ts'
import { useTitle } from '../use-title.ts'

export const loader = () => queryClient.ensureQueryData(signingKeyQuery)

/** My signing key: how it stands, and the making of one. */
export function Component() {
  useTitle('Signing key')
  const { data: session } = useSuspenseQuery(sessionQuery)
  const { data: key } = useSuspenseQuery(signingKeyQuery)
  const needed = key.status === 'none' || key.status === 'expired' || key.status === 'revoked'
  const [again, setAgain] = useState(false)
  const enrolling = needed || again
  return (
    <Ground>
      <PageHead title="Signing key" about={`Of ${session.person.name}`} />
      <Sheet>
        <Columns
          label="What protects the key"
          margin={
            <Section title="What protects it, and what does not">
              <WhatAPageCannotPrevent />
            </Section>
          }
        >
          <KeyStanding signingKey={key} />
          {key.enrolmentSha256 && (
            <div className="mt-4">
              <WaitingSuccessor myId={session.person.id} currentSha256={key.enrolmentSha256} />
            </div>
          )}
          {enrolling ? (
            <Section title={needed ? 'Enrol a key' : 'Enrol a new key'}>
              <EnrolForm
                key={key.enrolmentSha256}
                me={session.person}
                laboratory={session.laboratory}
                replaces={key.enrolmentSha256 !== null}
                onEnrolled={() => setAgain(false)}
              />
            </Section>
          ) : (
            <Section title="A new key">
              <p className="mb-2.5 max-w-[64ch]">
                Passphrase forgotten, or become known? Enrol a new key and have it endorsed. The old one signs
                until then, and stays valid for what it has signed.
              </p>
              <Button onClick={() => setAgain(true)}>Enrol a new key</Button>
            </Section>
          )}
        </Columns>
      </Sheet>
    </Ground>
  )
}

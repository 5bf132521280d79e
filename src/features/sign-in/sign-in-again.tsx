import { useQueryClient } from '@tanstack/react-query'
import { useEffect, useRef, useState, useSyncExternalStore } from 'react'
import type { Session } from '../../../server/contract/people.ts'
import { queryKeys } from '../../lib/query-keys.ts'
import {
  isWaitingForSignIn,
  letWaitingGo,
  onSignedInElsewhere,
  openSignInWindow,
  subscribeToGate,
} from '../../lib/session-gate.ts'
import { Button } from '../../ui/button.tsx'
import { Dialog } from '../../ui/dialog.tsx'
import { Message } from '../../ui/message.tsx'
import { sessionQuery } from './queries.ts'

/** The session ended while work is on the screen: sign in beside it, lose nothing. */
export function SignInAgain() {
  const waiting = useSyncExternalStore(subscribeToGate, isWaitingForSignIn)
  const client = useQueryClient()
  const [trouble, setTrouble] = useState<string | null>(null)
  const button = useRef<HTMLButtonElement>(null)

  useEffect(() => {
    if (!waiting) return
    const before = client.getQueryData<Session>(queryKeys.session)
    async function goOn() {
      const now = await client.fetchQuery({ ...sessionQuery, staleTime: 0 }).catch(() => null)
      if (!now) return setTrouble('Nobody is signed in yet.')
      if (before && now.person.id !== before.person.id) {
        return setTrouble(
          `This window holds the work of ${before.person.name}. Sign in as ${before.person.name} to go on.`,
        )
      }
      setTrouble(null)
      letWaitingGo()
    }
    return onSignedInElsewhere(() => void goOn())
  }, [waiting, client])

  function open() {
    const opened = openSignInWindow()
    setTrouble(
      opened ? null : 'The browser did not open a window. Allow windows for this page, then try again.',
    )
  }

  return (
    <Dialog
      open={waiting}
      locked
      onClose={() => {}}
      title="Your session has ended"
      about="What you wrote is still here and nothing is lost. Sign in again in a window of its own; this page then goes on where it was."
      initialFocus={button}
      actions={
        <Button kind="primary" icon="key" ref={button} onClick={open}>
          Sign in again
        </Button>
      }
    >
      {trouble && <Message kind="warn">{trouble}</Message>}
    </Dialog>
  )
}

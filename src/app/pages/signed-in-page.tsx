import { useEffect } from 'react'
import { reportSignedIn } from '../../lib/session-gate.ts'
import { EmptyState } from '../../ui/empty-state.tsx'
import { Ground } from '../../ui/ground.tsx'

/** End of a sign-in in a window of its own: tells the page that waits for it. */
export function Component() {
  useEffect(reportSignedIn, [])
  return (
    <Ground holes>
      <EmptyState title="You are signed in">
        The page where you were working goes on by itself. You can close this window.
      </EmptyState>
    </Ground>
  )
}

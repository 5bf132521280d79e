import { call } from '../../lib/call.ts'

/** Ends the session and starts afresh, so that nothing of the last person stays in memory. */
export async function signOut(): Promise<void> {
  await call('endSession', { signedOut: 'throw' }).catch(() => {
    // A session that has ended already is what we want.
  })
  location.assign('/sign-in')
}

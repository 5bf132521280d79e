import { queryOptions } from '@tanstack/react-query'
import { call } from '../../lib/call.ts'
import { queryKeys } from '../../lib/query-keys.ts'
import { noteSession } from '../../lib/session-gate.ts'
import { setLaboratoryZone } from '../../lib/times.ts'

/** Who is signed in. At the first look a missing session is thrown, so that the page can go to sign-in. */
export const sessionQuery = queryOptions({
  queryKey: queryKeys.session,
  queryFn: async () => {
    const session = await call('getSession', { signedOut: 'throw' })
    noteSession()
    setLaboratoryZone(session.laboratory.zone)
    return session
  },
  staleTime: 60_000,
  refetchInterval: 60_000,
})

/** What the sign-in page shows before anyone is known. */
export const welcomeQuery = queryOptions({
  queryKey: queryKeys.welcome,
  queryFn: () => call('getWelcome', {}),
  staleTime: Number.POSITIVE_INFINITY,
})

import { useSuspenseQuery } from '@tanstack/react-query'
import { useSearchParams } from 'react-router-dom'
import { HalfMirror } from '../../features/sign-in/half-mirror.tsx'
import { welcomeQuery } from '../../features/sign-in/queries.ts'
import { refusalSentence } from '../../features/sign-in/refusals.ts'
import { SignInPanel } from '../../features/sign-in/sign-in-panel.tsx'
import '../../features/sign-in/sign-in.css'
import { queryClient } from '../client.ts'
import { useTitle } from '../use-title.ts'

export const loader = () => queryClient.ensureQueryData(welcomeQuery)

export function Component() {
  const { data: welcome } = useSuspenseQuery(welcomeQuery)
  const [search] = useSearchParams()
  useTitle('Sign in')
  return (
    <main className="hs-sign-in" id="main">
      <SignInPanel
        welcome={welcome}
        refusal={refusalSentence(search.get('failed'))}
        returnTo={search.get('returnTo') ?? '/'}
      />
      <section className="hs-sign-in-picture hs-holes">
        <HalfMirror />
      </section>
    </main>
  )
}

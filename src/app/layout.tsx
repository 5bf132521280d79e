import { useSuspenseQuery } from '@tanstack/react-query'
import { Suspense, useState } from 'react'
import { Outlet, ScrollRestoration, useLocation, useNavigate } from 'react-router-dom'
import { sessionQuery } from '../features/sign-in/queries.ts'
import { SignInAgain } from '../features/sign-in/sign-in-again.tsx'
import { signOut } from '../features/sign-in/sign-out.ts'
import { KeysHelp } from '../ui/keys-help.tsx'
import { Rail } from '../ui/rail.tsx'
import { useKeys } from '../ui/use-keys.ts'
import { LoadingPage } from './loading-page.tsx'
import { paths } from './paths.ts'
import { railItems } from './places.ts'
import { pages } from './pages.ts'

const keyHelp = [
  { keys: ['g', 'b'], what: 'Go to the bench' },
  { keys: ['g', 'n'], what: 'Go to the notebooks' },
  { keys: ['g', 'w'], what: 'Go to the witness desk' },
  { keys: ['g', 'l'], what: 'Go to the ledger' },
  { keys: ['e'], what: 'On a sheet: write' },
  { keys: ['/'], what: 'In the text: insert a block, formula, calculation or result' },
  { keys: ['='], what: 'In the text, after a space: quote a result' },
  { keys: ['?'], what: 'This list' },
]

const singleKeysStored = 'halfsilver-single-keys'

/** The rail, the page under it, and what belongs to every page. */
export function Layout() {
  const { data: session } = useSuspenseQuery(sessionQuery)
  const { pathname } = useLocation()
  const navigate = useNavigate()
  const [help, setHelp] = useState(false)
  const [single, setSingle] = useState(() => localStorage.getItem(singleKeysStored) !== 'off')
  const built = pages.map((page) => page.path ?? '')
  const items = railItems(session, built, pathname)
  const go = (path: string) => () => items.some((item) => item.to === path) && void navigate(path)
  useKeys(
    {
      'g b': go(paths.bench),
      'g n': go(paths.notebooks),
      'g w': go(paths.witness),
      'g l': go(paths.ledger),
      '?': () => setHelp(true),
    },
    { single },
  )

  function chooseSingle(on: boolean) {
    localStorage.setItem(singleKeysStored, on ? 'on' : 'off')
    setSingle(on)
  }

  return (
    <>
      <Rail
        brand="Halfsilver"
        home={paths.bench}
        items={items}
        person={{
          name: session.person.name,
          note: `${session.roles.join(', ')} at ${session.laboratory.name}`,
          entries: [
            ...(built.includes(paths.keys) ? [{ label: 'Signing key', to: paths.keys }] : []),
            { label: 'Keys of the keyboard', act: () => setHelp(true) },
            { label: 'Sign out', act: () => void signOut() },
          ],
        }}
      />
      <Suspense fallback={<LoadingPage />}>
        <Outlet />
      </Suspense>
      <SignInAgain />
      <KeysHelp
        open={help}
        onClose={() => setHelp(false)}
        keys={keyHelp}
        single={single}
        onSingle={chooseSingle}
      />
      <ScrollRestoration />
    </>
  )
}

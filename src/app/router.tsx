import { createBrowserRouter, redirect } from 'react-router-dom'
import { sessionQuery } from '../features/sign-in/queries.ts'
import { ApiProblem } from '../lib/api-problem.ts'
import { queryClient } from './client.ts'
import { ErrorPage } from './error-page.tsx'
import { Layout } from './layout.tsx'
import { LoadingPage } from './loading-page.tsx'
import { page, pages } from './pages.ts'
import { paths } from './paths.ts'

export const router = createBrowserRouter([
  {
    ...page(paths.signIn, () => import('./pages/sign-in-page.tsx')),
    HydrateFallback: LoadingPage,
    ErrorBoundary: ErrorPage,
  },
  page('/signed-in', () => import('./pages/signed-in-page.tsx')),
  {
    id: 'signed-in',
    loader: requireSession,
    Component: Layout,
    ErrorBoundary: ErrorPage,
    HydrateFallback: LoadingPage,
    children: [
      // Errors of a page leave the rail standing.
      { ErrorBoundary: ErrorPage, children: [...pages, { path: '*', loader: notFound }] },
    ],
  },
])

async function requireSession({ request }: { request: Request }) {
  try {
    return await queryClient.ensureQueryData(sessionQuery)
  } catch (error) {
    if (!(error instanceof ApiProblem) || error.status !== 401) throw error
    const { pathname, search } = new URL(request.url)
    throw redirect(`${paths.signIn}?returnTo=${encodeURIComponent(pathname + search)}`)
  }
}

function notFound(): never {
  throw new Response(null, { status: 404 })
}

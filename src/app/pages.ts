import type { LazyRouteFunction, RouteObject } from 'react-router-dom'
import { paths } from './paths.ts'

/** A page module exports `Component` and, where it needs data first, `loader`. */
export const page = (path: string, lazy: LazyRouteFunction<RouteObject>): RouteObject => ({ path, lazy })

/** Pages inside the rail: one line each. A place of the rail appears when its page is here. */
export const pages: RouteObject[] = [
  page(paths.bench, () => import('./pages/bench-page.tsx')),
  page(paths.notebooks, () => import('./pages/notebooks-page.tsx')),
  page(paths.notebook, () => import('./pages/notebook-page.tsx')),
  page(paths.entry, () => import('./pages/entry-page.tsx')),
  page(paths.review, () => import('./pages/review-page.tsx')),
  page(paths.witness, () => import('./pages/witness-page.tsx')),
  page(paths.ledger, () => import('./pages/ledger-page.tsx')),
  page(paths.people, () => import('./pages/people-page.tsx')),
  page(paths.keys, () => import('./pages/key-page.tsx')),
]

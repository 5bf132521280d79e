/** Places of the program. Patterns for the router, functions for links. */
export const paths = {
  signIn: '/sign-in',
  bench: '/',
  notebooks: '/notebooks',
  notebook: '/notebooks/:notebookId',
  entry: '/entries/:entryId',
  review: '/entries/:entryId/review',
  witness: '/witness',
  ledger: '/ledger',
  people: '/people',
  keys: '/keys',
} as const

export const notebookPath = (id: string) => `/notebooks/${id}`
export const entryPath = (id: string) => `/entries/${id}`
export const reviewPath = (id: string) => `/entries/${id}/review`

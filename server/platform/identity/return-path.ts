/** The path to go to after signing in: only one of this site, never another site's address or the sign-in itself. */
export function returnPath(given: unknown, origin: string): string {
  if (typeof given !== 'string' || !given.startsWith('/') || !URL.canParse(given, origin)) return '/'
  const target = new URL(given, origin)
  if (target.origin !== origin || target.pathname.startsWith('/auth/') || target.pathname === '/sign-in')
    return '/'
  return target.pathname + target.search + target.hash
}

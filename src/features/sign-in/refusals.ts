const sentences: Record<string, string> = {
  'unknown-account':
    'The code host knows you, but nobody here has that account. Ask the laboratory manager to invite you, then sign in again.',
  'closed-account': 'Your account in this laboratory is closed. The laboratory manager can open it again.',
  'not-completed': 'The code host did not complete the sign-in. Nothing was changed; try again.',
}

/** Why a sign-in did not come about, by the code in the address; null when there is none. */
export function refusalSentence(code: string | null): string | null {
  if (code === null) return null
  return sentences[code] ?? 'The sign-in did not come about. Try again.'
}

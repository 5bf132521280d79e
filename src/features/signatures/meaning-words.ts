import type { EntrySignature, Meaning } from '../../../server/contract/signatures.ts'

/** What a signature means, as it is shown and printed with it; the three are never merged. */
export const meaningWords: Record<Meaning, string> = {
  authorship: 'Authorship',
  'witness-read': 'Witness, read and understood',
  'witness-present': 'Witness, was present and saw the measurement',
}

/** The time stamp of a signature in words. */
export function stampWords(stamp: EntrySignature['timeStamp']): string {
  if (stamp.status === 'pending') return 'not yet time-stamped'
  return stamp.independent
    ? `time stamp by ${stamp.authority}`
    : 'time stamp by the laboratory’s own authority'
}

/** The same as a sentence, for the result of signing. */
export function stampSentence(stamp: EntrySignature['timeStamp']): string {
  return stamp.status === 'pending'
    ? 'Its time stamp is still to come and joins by itself.'
    : `It carries a ${stampWords(stamp)}.`
}

import { ApiProblem, sentenceOf } from '../../lib/api-problem.ts'
import { clockTime } from '../../lib/times.ts'

export interface SigningTrouble {
  /** Beside the passphrase, or over the whole dialog. */
  at: 'passphrase' | 'dialog'
  words: string
  code?: string
}

/** What went wrong at signing, in a sentence: what is safe and what to do. */
export function signingTrouble(error: unknown): SigningTrouble {
  if (!(error instanceof ApiProblem)) return { at: 'dialog', words: sentenceOf(error) }
  const { code, detail, extra } = error
  if (code === 'wrong-passphrase') return { at: 'passphrase', words: attemptsWords(extra.attemptsLeft) }
  if (code === 'signing-locked')
    return { at: 'passphrase', words: lockedWords(typeof extra.until === 'string' ? extra.until : null) }
  return { at: 'dialog', words: `${detail} Nothing was signed.`, code }
}

function attemptsWords(left: unknown): string {
  const first = 'This passphrase does not open your key. Nothing was signed.'
  if (typeof left !== 'number') return first
  return `${first} ${left === 1 ? 'One attempt is' : `${left} attempts are`} left before signing is locked for 15 minutes.`
}

/** After five wrong passphrases, or while that lock lasts. */
export function lockedWords(until: string | null): string {
  return `Signing is locked${until === null ? '' : ` until ${clockTime(until)}`} after five wrong passphrases. The text and the signatures given are safe; if it was not you, tell the laboratory manager.`
}

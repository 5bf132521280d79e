import type { z } from 'zod'
import type { verificationSchema } from '../../../server/contract/ledger.ts'
import { eventNumber } from './event-number.ts'

export type Verification = z.infer<typeof verificationSchema>

export interface Standing {
  state: 'ok' | 'queued' | 'note' | 'fault'
  words: string
}

/**
 * What is known of an event: whether the last verification reached it, and whether a signed head covers it. Without a
 * verification only the head is told.
 */
export function standingOf(
  sequence: number,
  verification: Verification | undefined,
  treeSize: number | null,
): Standing {
  const broken = verification?.firstBroken
  if (broken && sequence === broken.sequence) return { state: 'fault', words: 'breaks here' }
  if (broken && sequence > broken.sequence) return { state: 'note', words: 'after the break' }
  const covered = treeSize !== null && sequence <= treeSize
  return covered
    ? { state: 'ok', words: `under head ${eventNumber(treeSize)}` }
    : { state: 'queued', words: 'not yet under a head' }
}

/** The result in one sentence, as the title of the page. */
export function resultWords(verification: Verification): string {
  if (verification.holds) return 'The chain holds'
  const broken = verification.firstBroken
  if (broken) return `The chain breaks at event ${eventNumber(broken.sequence)}`
  return 'The chain and the head do not agree'
}

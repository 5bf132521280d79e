import type { Person } from '../../../server/contract/people.ts'
import type { StateName } from '../../ui/state-glyph.tsx'

export type KeyStatus = Person['signingKey']

/** How a signing key stands, as a glyph and words; used wherever a key is shown. */
export const keyStanding: Record<KeyStatus, { state: StateName; words: string }> = {
  none: { state: 'draft', words: 'No key' },
  'awaiting-endorsement': { state: 'note', words: 'Waits for endorsement' },
  active: { state: 'ok', words: 'Active' },
  locked: { state: 'fault', words: 'Locked' },
  expired: { state: 'note', words: 'Certificate ended' },
  revoked: { state: 'withdrawn', words: 'Revoked' },
}

import { entryActions, notebookRights, type EntryAction } from '../../contract/policy.ts'
import { Problem, nothingHere } from '../../contract/problems.ts'
import type { Meaning } from '../../contract/signatures.ts'
import type { Transaction } from '../../platform/db/database.ts'
import type { Services } from '../../platform/services.ts'
import { hasContributed, lockEntry, writersOf, type EntryRow } from '../entries/index.ts'
import { lockPerson, type PersonToSign } from '../keys/index.ts'
import { findMembership } from '../notebooks/index.ts'
import { livingSignatures, type SignatureRow } from './repository.ts'

/** A person before an entry, everything read under locks: what held at the start of the request may hold no more. */
export interface Standing {
  person: PersonToSign
  entry: EntryRow
  /** Living signatures of the entry in the order of their events. */
  living: SignatureRow[]
  allowed: ReadonlySet<EntryAction>
  mayWrite: boolean
}

/** Locks person, then entry, and reads rights afresh. Who may not read the entry is told that there is none. */
export async function standingOf(
  services: Pick<Services, 'db'>,
  personId: string,
  entryId: string,
  t: Transaction,
): Promise<Standing> {
  const { db } = services
  const person = await lockPerson(db, personId, t)
  const entry = person && (await lockEntry(db, entryId, t))
  const rights =
    entry && notebookRights(person.roles, await findMembership(db, entry.notebookId, personId, t))
  if (!person || !entry || !rights?.has('read')) throw nothingHere()
  const living = await livingSignatures(db, entryId, t)
  const own = living.filter((signature) => signature.personId === personId)
  const writers = await writersOf(db, [entryId], t)
  const allowed = entryActions(entry.phase, {
    rights,
    author: writers.some((writer) => writer.personId === personId),
    contributed: await hasContributed(db, entryId, personId, t),
    signedAsAuthor: own.some(({ meaning }) => meaning === 'authorship'),
    witnessed: own.some(({ meaning }) => meaning !== 'authorship'),
  })
  return { person, entry, living, allowed: new Set(allowed), mayWrite: rights.has('write') }
}

const actionOf: Record<Meaning, EntryAction> = {
  authorship: 'sign:authorship',
  'witness-read': 'witness:read',
  'witness-present': 'witness:present',
}

/** Refuses a signature that this person cannot give now: by state when nobody could, else by right. */
export function requireSigning({ entry, allowed }: Standing, meaning: Meaning): void {
  if (allowed.has(actionOf[meaning])) return
  if (entry.state === 'sealed' || entry.state === 'withdrawn')
    throw new Problem('wrong-state', `The entry is ${entry.state}; it takes no more signatures.`)
  if (meaning === 'authorship') {
    if (entry.phase === 'with-witness')
      throw new Problem('wrong-state', 'All authors have signed; the entry is with its witness.')
    throw new Problem(
      'not-allowed',
      'Only who wrote in this entry, may write here and has not signed yet signs as its author.',
    )
  }
  if (entry.phase !== 'with-witness')
    throw new Problem('wrong-state', 'The entry is witnessed after all its authors have signed.')
  throw new Problem(
    'not-allowed',
    'A witness is a supervisor of this notebook who wrote and supplied nothing of the entry and has not witnessed it yet.',
  )
}

/** Refuses an act that is not open to this person now. */
export function requireAction(
  { entry, allowed, mayWrite }: Standing,
  action: EntryAction,
  sentence: string,
): void {
  if (allowed.has(action)) return
  const states: Partial<Record<EntryAction, readonly string[]>> = {
    return: ['with-witness'],
    reopen: ['collecting'],
    withdraw: ['writing', 'returned'],
    addendum: ['sealed'],
  }
  if (!states[action]?.includes(entry.phase))
    throw new Problem('wrong-state', `${sentence} The entry is ${entry.phase}.`)
  throw new Problem(
    'not-allowed',
    mayWrite
      ? 'This is for others to do in this entry.'
      : 'Your role in this notebook does not include this.',
  )
}

import { randomUUID } from 'node:crypto'
import type { EntryPhase, EntryState } from '../../../contract/policy.ts'
import type { Transaction } from '../../../platform/db/database.ts'
import type { Actor } from '../../../platform/http/actor.ts'
import type { Services } from '../../../platform/services.ts'
import { updateEntry } from '../../entries/index.ts'
import { appendEvent } from '../../ledger/index.ts'
import { tellAuthors } from '../letters.ts'
import { requireAction, standingOf, type Standing } from '../standing.ts'

type State = { state: EntryState; phase: EntryPhase }

/**
 * Back to the authors: by a witness, by an author who recalls the entry, or while signatures are being collected. Every
 * signature given is void from then on and stays in the record.
 */
export async function returnEntry(
  services: Services,
  { personId }: Pick<Actor, 'personId'>,
  entryId: string,
  reason: string,
): Promise<State> {
  return services.db.transaction(async (t) => {
    const standing = await standingOf(services, personId, entryId, t)
    const kind = standing.entry.phase === 'collecting' ? 'reopened' : 'returned'
    requireAction(
      standing,
      kind === 'reopened' ? 'reopen' : 'return',
      'An entry is given back while it is being signed or with its witness.',
    )
    const state: State = { state: 'draft', phase: kind === 'reopened' ? 'writing' : 'returned' }
    await updateEntry(
      services.db,
      entryId,
      { ...state, bodySha256: null, submittedAt: null },
      services.clock.now(),
      t,
    )
    await tellAuthors(services, standing.entry, reason, personId, t)
    await recordVoiding(services, standing, kind, reason, t)
    return state
  })
}

async function recordVoiding(
  services: Services,
  { person, entry, living }: Standing,
  kind: 'returned' | 'reopened',
  reason: string,
  t: Transaction,
): Promise<void> {
  const event = await appendEvent(services, t, {
    actor: { kind: 'person', id: person.id, onBehalfOf: null },
    action: `entry.${kind}`,
    subject: { kind: 'entry', id: entry.id },
    payload: { reason, voided: living.map(({ recordSha256 }) => recordSha256) },
  })
  await services.db.run(
    `insert into record.returns (id, entry_id, kind, by_person, reason, at) values (:id, :entryId, :kind, :personId, :reason, :at)`,
    { id: randomUUID(), entryId: entry.id, kind, personId: person.id, reason, at: event.time },
    t,
  )
  for (const { recordSha256 } of living)
    await services.db.run(
      `insert into record.voidings (record_sha256, voided_at, event_sequence) values (:recordSha256, :at, :sequence)`,
      { recordSha256, at: event.time, sequence: event.sequence },
      t,
    )
}

/** Puts a draft without living signatures aside; it stays readable for ever and keeps its number. */
export async function withdrawEntry(
  services: Services,
  { personId }: Pick<Actor, 'personId'>,
  entryId: string,
  reason: string,
): Promise<State> {
  return services.db.transaction(async (t) => {
    const standing = await standingOf(services, personId, entryId, t)
    requireAction(standing, 'withdraw', 'Only a draft without signatures is withdrawn.')
    const state: State = { state: 'withdrawn', phase: 'withdrawn' }
    await updateEntry(services.db, entryId, state, services.clock.now(), t)
    await appendEvent(services, t, {
      actor: { kind: 'person', id: personId, onBehalfOf: null },
      action: 'entry.withdrawn',
      subject: { kind: 'entry', id: entryId },
      payload: { reason, voided: [] },
    })
    return state
  })
}

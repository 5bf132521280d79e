import type { Transaction } from 'sequelize'
import { buildEvent, type Actor, type Subject } from '../../ledger-format/event.ts'
import type { Json } from '../../ledger-format/canonical-json.ts'
import type { Services } from '../../platform/services.ts'

export interface NewEvent {
  actor: Actor
  action: string
  subject: Subject
  /** Exactly the members that shapes 3 names for the action; ids, digests, codes and reasons for others. */
  payload: { [member: string]: Json }
}

export interface AppendedEvent {
  sequence: number
  /** SHA-256 of the canonical event, hex. */
  digest: string
  leafHash: string
  /** UTC with milliseconds. */
  time: string
}

interface LedgerState {
  tree_size: string
  last_digest: string
  last_at: Date | null
}

// One number for the whole product: whoever appends holds this lock until the transaction ends.
const ledgerLock = 4310_2026

/**
 * Takes the ledger's lock until the transaction ends, so that what is read afterwards stays the newest. `appendEvent` does
 * it by itself; call it before only when the payload depends on where the chains stand.
 */
export async function lockLedger(services: Pick<Services, 'db'>, t: Transaction): Promise<void> {
  await services.db.run('select pg_advisory_xact_lock(:ledgerLock)', { ledgerLock }, t)
}

/**
 * Appends an event in the caller's transaction: it exists exactly when the change that it tells of does. To be called last
 * in a transaction, since all other writers wait for its end. The database checks the chain once more and keeps the tree.
 * The time is that of the clock, but always later than the event before.
 * @throws Error naming the member when the payload is not that of its action.
 */
export async function appendEvent(
  services: Pick<Services, 'db' | 'clock'>,
  t: Transaction,
  event: NewEvent,
): Promise<AppendedEvent> {
  await lockLedger(services, t)
  const [state, before] = [await readState(services, t), await lastOfSubject(services, t, event.subject)]
  const built = buildEvent({
    epoch: await currentEpoch(services, t, state),
    sequence: Number(state.tree_size) + 1,
    time: nextTime(services.clock.now(), state.last_at),
    actor: event.actor,
    action: event.action,
    subject: event.subject,
    subjectSequence: Number(before?.subject_sequence ?? 0) + 1,
    subjectPrevious: before?.digest ?? null,
    payload: event.payload,
    previous: state.last_digest,
  })
  const { sequence, time, actor, action, subject, subjectSequence } = built.event
  await services.db.run(
    `insert into record.events
       (sequence, at, action, actor_id, subject_kind, subject_id, subject_sequence, canonical, digest, leaf_hash)
     values (:sequence, :time, :action, :actorId, :kind, :id, :subjectSequence, :canonical, :digest, :leafHash)`,
    {
      sequence,
      time,
      action,
      actorId: actor.onBehalfOf ?? (actor.kind === 'person' ? actor.id : null),
      kind: subject.kind,
      id: subject.id,
      subjectSequence,
      canonical: Buffer.from(built.canonical),
      digest: built.digest,
      leafHash: built.leafHash,
    },
    t,
  )
  return { sequence, digest: built.digest, leafHash: built.leafHash, time }
}

async function readState(services: Pick<Services, 'db'>, t: Transaction): Promise<LedgerState> {
  const state = await services.db.row<LedgerState>(
    'select tree_size, last_digest, last_at from record.ledger_state',
    {},
    t,
  )
  if (!state) throw new Error('The ledger has no state row: the database was not migrated.')
  return state
}

function lastOfSubject(services: Pick<Services, 'db'>, t: Transaction, { kind, id }: Subject) {
  return services.db.row<{ subject_sequence: string; digest: string }>(
    `select subject_sequence, digest from record.events
     where subject_kind = :kind and subject_id = :id order by subject_sequence desc limit 1`,
    { kind, id },
    t,
  )
}

/** A restored ledger goes on in a new epoch (rulings 32); every event keeps that of the event before. */
async function currentEpoch(
  services: Pick<Services, 'db'>,
  t: Transaction,
  state: LedgerState,
): Promise<number> {
  const last = await services.db.row<{ epoch: string }>(
    `select convert_from(canonical, 'UTF8')::jsonb ->> 'epoch' as epoch from record.events where sequence = :last`,
    { last: state.tree_size },
    t,
  )
  return Number(last?.epoch ?? 1)
}

function nextTime(now: Date, last: Date | null): string {
  const earliest = last ? last.getTime() + 1 : 0
  return new Date(Math.max(now.getTime(), earliest)).toISOString()
}

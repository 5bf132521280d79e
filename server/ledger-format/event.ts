import { z } from 'zod'
import { canonicalBytes } from './canonical-json.ts'
import { sha256Hex, toHex } from './digest.ts'
import { payloadForm, type KnownAction, type PayloadOf } from './event-payloads.ts'
import { checkForm, countForm, freeForm, hexForm, idForm, schemaName, textForm, timeForm } from './forms.ts'
import { leafHash } from './merkle.ts'

export const subjectKinds = ['laboratory', 'notebook', 'entry', 'run', 'person', 'key', 'apparatus'] as const

const actorForm = z.strictObject({
  kind: z.enum(['person', 'token', 'worker', 'system']),
  id: idForm.nullable(),
  onBehalfOf: idForm.nullable(),
})
const subjectForm = z.strictObject({ kind: z.enum(subjectKinds), id: idForm })

/** A ledger event (shapes 3). The form of the payload follows from the action: `checkEvent`. */
export const eventForm = z.strictObject({
  schema: schemaName('event/1'),
  epoch: countForm,
  sequence: countForm,
  time: timeForm,
  actor: actorForm,
  action: textForm,
  subject: subjectForm,
  subjectSequence: countForm,
  subjectPrevious: hexForm.nullable(),
  payload: freeForm,
  previous: hexForm,
})
export type LedgerEvent = z.infer<typeof eventForm>
export type Actor = z.infer<typeof actorForm>
export type Subject = z.infer<typeof subjectForm>

/** `previous` of the first event. */
export const noPrevious = '0'.repeat(64)

/** Throws one sentence when a value is no event, or its payload not that of its action. */
export function checkEvent(value: unknown): asserts value is LedgerEvent {
  checkForm(eventForm, value)
  const payload = payloadForm(value.action).safeParse(value.payload)
  if (!payload.success) {
    const issue = payload.error.issues[0]
    throw new Error(`/payload/${issue?.path.join('/') ?? ''}: ${issue?.message ?? 'does not fit'}`)
  }
}

/** Payload of an event of a known action; null for an event of another action. */
export function payloadOf<Action extends KnownAction>(
  event: LedgerEvent,
  action: Action,
): PayloadOf<Action> | null {
  return event.action === action ? (event.payload as PayloadOf<Action>) : null
}

/** An event with everything that follows from it. */
export interface BuiltEvent {
  event: LedgerEvent
  /** JCS of the event: what is hashed, and one line of events.jsonl. */
  canonical: Uint8Array
  /** SHA-256 of `canonical`, hex. */
  digest: string
  /** SHA-256 of 0x00 and `canonical`, hex: the leaf of the Merkle tree. */
  leafHash: string
}

/**
 * Builds the event that follows another one; checks its form and payload.
 * `subjectPrevious` is the digest of the subject's event before (null for its first), `previous` that of the ledger's
 * (`noPrevious` for event 1). @throws Error that names the member that does not fit.
 */
export function buildEvent(parts: Omit<LedgerEvent, 'schema'>): BuiltEvent {
  const event: LedgerEvent = { schema: 'halfsilver-event/1', ...parts }
  checkEvent(event)
  return describeEvent(event, canonicalBytes(event))
}

/** Digest and leaf hash of an event whose canonical bytes are at hand. */
export function describeEvent(event: LedgerEvent, canonical: Uint8Array): BuiltEvent {
  return { event, canonical, digest: sha256Hex(canonical), leafHash: toHex(leafHash(canonical)) }
}

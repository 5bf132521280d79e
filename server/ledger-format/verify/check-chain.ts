import type { SignedRecord } from '../record.ts'
import { sameBytes } from '../bytes.ts'
import { canonicalBytes } from '../canonical-json.ts'
import type { LedgerEvent } from '../event.ts'
import type { KnownAction } from '../event-payloads.ts'
import { eventsOf, type VerifiedEvent } from './check-events.ts'
import type { EntryPlace, VerifiedSignature } from './check-signatures.ts'
import { sameSet } from './in-order.ts'
import { need, present, Wrong } from './report.ts'

/** An entry's own events, its record, and its signatures. */
export interface EntryStory {
  place: EntryPlace
  record: SignedRecord
  /** Of the entry and of the runs filed into it. */
  events: readonly VerifiedEvent[]
  living: readonly VerifiedSignature[]
  voided: readonly VerifiedSignature[]
}

const sequenceOf = (signature: VerifiedSignature) =>
  present(signature.event, 'a signature has no event').sequence

/** Sequence of the first living signature. */
export function firstSignature(living: readonly VerifiedSignature[]): number {
  return Math.min(...living.map(sequenceOf))
}

/** Created, revised, signed, returned, sealed: the chain says the same as the folders and the body. */
export function checkChainOfEntry(story: EntryStory): void {
  const { place, record, living } = story
  const own = story.events.filter(({ event }) => event.subject.id === place.entryId)
  const created = present(own[0], 'no events').event
  const due = canonicalBytes({ notebookId: record.notebook.id, number: record.entry.number })
  const begins = created.action === 'entry.created' && sameBytes(canonicalBytes(created.payload), due)
  need(begins, 'chain does not begin with entry.created of this notebook and number')
  const first = firstSignature(living)
  checkSeal(own, record, living)
  checkVoided(own, story)
  const revised = eventsOf(own, 'entry.revised')
  const last = revised.filter(({ event }) => event.sequence < first).at(-1)?.payload
  const isBody = last?.revision === record.entry.revision && last.contentSha256 === record.contentSha256
  need(isBody, 'last revision of the chain is not the body’s')
  need(!revised.some(({ event }) => event.sequence > first), 'revised after the first living signature')
}

const beforeSeal: readonly KnownAction[] = [
  'entry.signed',
  'entry.revised',
  'entry.reopened',
  'entry.returned',
  'entry.withdrawn',
  'entry.run-filed',
  'entry.author-excepted',
]

function checkSeal(
  own: readonly VerifiedEvent[],
  record: SignedRecord,
  living: readonly VerifiedSignature[],
): void {
  const [sealed, ...more] = eventsOf(own, 'entry.sealed')
  if (!sealed || more.length > 0) throw new Wrong('not sealed once')
  need(sealed.payload.bodySha256 === record.bodySha256, 'sealed with another body')
  const named = sameSet(
    sealed.payload.signatures,
    living.map((signature) => signature.recordSha256),
  )
  need(named, 'signatures/ is not what entry.sealed names')
  const late = own.some(
    ({ event }) =>
      (beforeSeal as readonly string[]).includes(event.action) && event.sequence > sealed.event.sequence,
  )
  need(!late, 'changed after the seal')
}

/** Events that void signatures. */
function voidings(own: readonly VerifiedEvent[]) {
  return (['entry.reopened', 'entry.returned', 'entry.withdrawn'] as const).flatMap((action) =>
    eventsOf(own, action),
  )
}

function checkVoided(own: readonly VerifiedEvent[], { record, living, voided }: EntryStory): void {
  const ended = new Map<string, LedgerEvent>(
    voidings(own).flatMap(({ event, payload }) => payload.voided.map((digest) => [digest, event] as const)),
  )
  const history = new Map(record.history.voided.map((item) => [item.recordSha256, item.signatureSha256]))
  for (const signature of voided) {
    const listed = history.get(signature.recordSha256) === signature.signatureSha256
    need(listed, `${signature.path} is not in history.voided`)
  }
  const complete = voided.length === history.size && history.size === record.history.voided.length
  need(complete, 'voided/ lacks a signature of history.voided, or has one twice')
  need(sameSet([...history.keys()], [...ended.keys()]), 'history.voided is not what the chain voided')
  for (const signature of voided) {
    const end = present(ended.get(signature.recordSha256), 'a voided signature has no end in the chain')
    need(sequenceOf(signature) < end.sequence, 'voided before it was signed')
  }
  const signed = new Set(eventsOf(own, 'entry.signed').map(({ payload }) => payload.recordSha256))
  const folders = new Set([...living, ...voided].map((signature) => signature.recordSha256))
  need(sameSet([...signed], [...folders]), 'a signature of the chain has no folder')
  need(!living.some((signature) => ended.has(signature.recordSha256)), 'a voided signature counts as living')
  const told = [...eventsOf(own, 'entry.reopened'), ...eventsOf(own, 'entry.returned')]
  const fromChain = told.map(({ event, payload }) => `${event.actor.id} ${payload.reason ?? ''}`)
  const fromBody = record.history.returns.map((item) => `${item.bySubjectId} ${item.reason ?? ''}`)
  need(sameSet(fromChain, fromBody), 'history.returns is not what the chain tells')
}

/** Whoever the chain names as writer, uploader or exception stands in the body. */
export function checkPeople({ record, events }: EntryStory): void {
  const wrote = new Map(
    record.authors.flatMap((author) => author.revisions.map((n) => [n, author.subjectId] as const)),
  )
  const total = record.authors.reduce((sum, author) => sum + author.revisions.length, 0)
  need(wrote.size === total, 'a revision has two authors')
  const revised = eventsOf(events, 'entry.revised')
  const numbers = revised.map(({ payload }) => String(payload.revision))
  need(sameSet(numbers, [...wrote.keys()].map(String)), 'revisions of the authors are not those of the chain')
  for (const { event, payload } of revised) {
    need(
      writerOf(event) === wrote.get(payload.revision),
      `revision ${payload.revision} is not by the author whose it is`,
    )
  }
  const helped = new Set(record.contributors.map((person) => person.subjectId))
  for (const { event } of [...eventsOf(events, 'file.stored'), ...eventsOf(events, 'reading.set')]) {
    const who = event.actor.onBehalfOf ?? (event.actor.kind === 'person' ? event.actor.id : null)
    need(
      !who || helped.has(who),
      `sequence ${event.sequence}: ${event.action} by somebody who is no contributor`,
    )
  }
  const fromChain = eventsOf(events, 'entry.author-excepted').map(
    ({ event, payload }) => `${payload.subjectId} ${event.actor.id} ${payload.reason}`,
  )
  const fromBody = record.authors.flatMap(({ subjectId, exception }) =>
    exception ? [`${subjectId} ${exception.bySubjectId} ${exception.reason}`] : [],
  )
  need(sameSet(fromChain, fromBody), 'exceptions are not those that the chain tells')
}

/** The person who wrote a revision: himself, or by his token; null for workers and the system. */
function writerOf({ actor }: LedgerEvent): string | null {
  if (actor.kind === 'person') return actor.id
  return actor.kind === 'token' ? actor.onBehalfOf : null
}

/** Runs, files, readings and calculations of the body are those of the chains. */
export function checkThings({ record, events, living }: EntryStory): void {
  const filed = eventsOf(events, 'entry.run-filed').map(({ payload }) => payload.runId)
  need(
    sameSet(
      filed,
      record.runs.map((run) => run.id),
    ),
    'runs are not those filed',
  )
  const stored = eventsOf(events, 'file.stored').map(
    ({ payload }) => `${payload.fileId} ${payload.sha256} ${payload.size}`,
  )
  need(
    sameSet(
      stored,
      record.files.map((file) => `${file.id} ${file.sha256} ${file.size}`),
    ),
    'files are not those stored',
  )
  const readings = new Map(
    eventsOf(events, 'reading.set').map(({ payload }) => [payload.fileId, payload.readingSha256]),
  )
  for (const file of record.files) {
    const last = readings.get(file.id)
    need(last === undefined || last === file.reading?.sha256, `reading is not the last one set: ${file.name}`)
  }
  const finished = eventsOf(events, 'calculation.finished')
  const ids = finished.map(({ payload }) => payload.calculationId)
  need(new Set(ids).size === ids.length, 'a calculation is finished twice')
  const first = firstSignature(living)
  for (const calculation of record.calculations) {
    const { id: calculationId, kind, version, engine, resultSha256 } = calculation
    const due = canonicalBytes({ calculationId, kind, version, engine, resultSha256 })
    const told = finished.some(
      ({ event, payload }) => event.sequence < first && sameBytes(canonicalBytes(payload), due),
    )
    need(told, `${calculation.label} is not a finished calculation of the chain`)
  }
}

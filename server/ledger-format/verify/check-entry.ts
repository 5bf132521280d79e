import type { SignedRecord } from '../record.ts'
import { bodyOf } from '../record.ts'
import { sameBytes } from '../bytes.ts'
import { canonicalBytes } from '../canonical-json.ts'
import { entryFolder, dataPath } from '../bundle/layout.ts'
import type { Case } from './case.ts'
import { checkOrder, checkReferences } from './check-body.ts'
import { checkChainOfEntry, checkPeople, checkThings, type EntryStory } from './check-chain.ts'
import { checkEvents, eventsOf, type LeafPlace, type VerifiedEvent } from './check-events.ts'
import { checkAuthors, checkEarlier, checkWitnesses } from './check-people.ts'
import { checkRawFiles } from './check-raw.ts'
import { checkAttachments, checkRendered } from './check-rendered.ts'
import { checkResults } from './check-results.ts'
import {
  checkSignature,
  readSignatures,
  type EntryPlace,
  type VerifiedSignature,
} from './check-signatures.ts'
import { need, present } from './report.ts'

/** One entry of the bundle as read; `record` is that of its first living signature. */
export interface VerifiedEntry {
  number: string
  record: SignedRecord | null
  living: VerifiedSignature[]
  voided: VerifiedSignature[]
  events: VerifiedEvent[]
  /** Enrolments of all its signers. */
  signers: Set<string>
}

/** Reads an entry's signatures and events. All entries are read before any is checked, since they may refer to each other. */
export function readEntry(c: Case, place: EntryPlace): void {
  const folder = entryFolder(place.number)
  const living = readSignatures(c, `${folder}signatures/`)
  const voided = readSignatures(c, `${folder}voided/`)
  const entry: VerifiedEntry = {
    number: place.number,
    record: living[0]?.record ?? null,
    living,
    voided,
    events: [],
    signers: new Set(),
  }
  let bounds: LeafPlace[] = []
  c.report.check('records', `${folder}signatures/`, () => {
    need(living.length > 0, 'no living signature')
    const signings = [...living, ...voided].flatMap(({ record }) => (record ? [record.signing] : []))
    bounds = signings.map(({ ledger }) => ({ sequence: ledger.sequence, leafHash: ledger.leafHash }))
    entry.signers = new Set(signings.map(({ signer }) => signer.enrolmentSha256))
  })
  entry.events = checkEvents(c, `${folder}ledger/`, { kind: 'entry', id: place.entryId }, bounds)
  c.entries.set(place.entryId, entry)
}

/** All checks of one entry, living and voided signatures first. */
export function checkEntry(c: Case, place: EntryPlace): void {
  const folder = entryFolder(place.number)
  const {
    living,
    voided,
    events,
    record: first,
    signers,
  } = present(c.entries.get(place.entryId), 'entry could not be read')
  for (const signature of [...living, ...voided]) checkSignature(c, place, signature, events)
  // Files of the entry are called for even when its record is damaged.
  for (const path of [`${folder}entry.pdf`, `${folder}entry.html`]) {
    c.report.check('rendition', path, () => need(c.read(path).length > 0, 'file is empty'))
  }
  const record = present(first, 'the first record could not be read')
  const story: EntryStory = { place, record, events, living, voided }
  checkOneBody(c, record, living)
  const path = `${folder}signatures/1-authorship/record.json`
  c.report.check('order', path, () => checkOrder(record))
  c.report.check('references', path, () => checkReferences(c, record))
  c.report.check('authors', path, () => checkAuthors(record, living))
  c.report.check('witnesses', path, () => checkWitnesses(record, living))
  c.report.check('earlier signatures', path, () => checkEarlier(living))
  c.report.check('people', path, () => checkPeople(story))
  c.report.check('things', path, () => checkThings(story))
  c.report.check('amends', path, () => checkAmends(c, record, events))
  const eventsPath = `${folder}ledger/events.jsonl`
  c.report.check('chain of the entry', eventsPath, () => {
    checkChainOfEntry(story)
    checkAddendaThere(c, events)
  })
  c.report.check('rendered', eventsPath, () => checkRendered(c, folder, story, signers))
  c.report.check('attachments', `${folder}entry.pdf`, () =>
    checkAttachments(c.read(`${folder}entry.pdf`), living),
  )
  c.report.check('results', `${folder}calculations/`, () => checkResults(c, folder, record))
  c.report.check('raw files', `${folder}raw/`, () => checkRawFiles(c, folder, record))
  if (record.laboratory.demo) c.report.remark('laboratory', path, 'a demonstration laboratory')
}

function checkOneBody(c: Case, record: SignedRecord, living: readonly VerifiedSignature[]): void {
  const body = canonicalBytes(bodyOf(record))
  for (const signature of living) {
    c.report.check('one body', signature.file('record'), () => {
      const other = signature.read()
      const same = other.bodySha256 === record.bodySha256 && sameBytes(canonicalBytes(bodyOf(other)), body)
      need(same, 'body differs from that of the first signature')
    })
  }
}

function checkAddendaThere(c: Case, events: readonly VerifiedEvent[]): void {
  const leftOut = c.leftOut('entry')
  for (const { payload } of eventsOf(events, 'entry.amended')) {
    const there = c.entries.has(payload.byEntryId) || leftOut.has(payload.byEntryId)
    need(there, 'an addendum is neither in entries nor in leftOut')
  }
}

/** An addendum: what it amends is there with that body, and its chain tells of this one, together with the seal. */
function checkAmends(c: Case, record: SignedRecord, events: readonly VerifiedEvent[]): void {
  const { amends } = record.entry
  if (!amends) return
  const other = c.entries.get(amends.entryId)
  if (!other) {
    need(c.leftOut('entry').has(amends.entryId), 'what it amends is neither in entries nor in leftOut')
    return
  }
  const same = other.number === amends.number && other.record?.bodySha256 === amends.bodySha256
  need(same, 'amends another body or number')
  const told = eventsOf(other.events, 'entry.amended').filter(
    ({ payload }) => payload.byEntryId === record.entry.id,
  )
  const [only, ...more] = told
  const once = more.length === 0 && only?.payload.bodySha256 === record.bodySha256
  need(once, 'the chain of what it amends does not tell once of this body')
  const amendedAt = only?.event.sequence ?? 0
  const together = eventsOf(events, 'entry.sealed').some(
    ({ event }) => Math.abs(event.sequence - amendedAt) === 1,
  )
  need(together, 'entry.amended was not made together with entry.sealed')
}

/** The head is that of the last entry.rendered here: a chain cannot be cut short, nor the newest entry be dropped. */
export function checkState(c: Case): void {
  c.report.check('state', dataPath.head, () => {
    const rendered = [...c.entries.values()].flatMap((entry) => eventsOf(entry.events, 'entry.rendered'))
    const last = Math.max(...rendered.map(({ event }) => event.sequence))
    need(last === c.head.treeSize, `head is not that of the last entry.rendered here, ${last}`)
  })
}

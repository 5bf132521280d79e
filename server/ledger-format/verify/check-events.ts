import { parseCanonical, parseJson } from '../canonical-json.ts'
import { proofsForm, type Proofs } from '../bundle/description.ts'
import { fromHex, toHex } from '../digest.ts'
import {
  checkEvent,
  describeEvent,
  noPrevious,
  payloadOf,
  type BuiltEvent,
  type LedgerEvent,
} from '../event.ts'
import type { KnownAction, PayloadOf } from '../event-payloads.ts'
import { checkForm } from '../forms.ts'
import { rootOfInclusion } from '../merkle.ts'
import type { Case } from './case.ts'
import { need, present } from './report.ts'

/** An event of the bundle and the file it stands in. */
export interface VerifiedEvent extends BuiltEvent {
  path: string
}

export const chainKey = (kind: string, id: string): string => `${kind} ${id}`

/** An event's sequence and leaf, as a proof must name it. */
export interface LeafPlace {
  sequence: number
  leafHash: string
}

/** Events of one action with their payloads. */
export function eventsOf<Action extends KnownAction>(
  events: readonly VerifiedEvent[],
  action: Action,
): { event: LedgerEvent; payload: PayloadOf<Action> }[] {
  return events.flatMap(({ event }) => {
    const payload = payloadOf(event, action)
    return payload === null ? [] : [{ event, payload }]
  })
}

/**
 * One events.jsonl with its proofs.json: chains 1..n of the subject and of the runs filed into it, nobody else's, and one
 * proof to the head for each event and each lower bound.
 */
export function checkEvents(
  c: Case,
  folder: string,
  subject: { kind: 'entry' | 'key'; id: string },
  bounds: readonly LeafPlace[] = [],
): VerifiedEvent[] {
  const path = `${folder}events.jsonl`
  const found: VerifiedEvent[] = []
  c.report.check('ledger events', path, () => {
    const lines = linesOf(c.read(path))
    lines.forEach((line, i) => {
      const event = c.report.check('ledger event', `${path} line ${i + 1}`, () => readEvent(c, line, path))
      if (event) found.push(event)
    })
    const sequences = found.map(({ event }) => event.sequence)
    need(
      sequences.every((n, i) => i === 0 || (sequences[i - 1] ?? n) < n),
      'not in order of sequence',
    )
  })
  c.report.check('ledger chains', path, () => checkFolderChains(c, found, subject))
  c.report.check('inclusion proofs', `${folder}proofs.json`, () =>
    checkProofs(c, `${folder}proofs.json`, found, bounds),
  )
  return found
}

/** Lines of a file whose last line ends; at least one. */
function linesOf(bytes: Uint8Array): Uint8Array[] {
  need(bytes.length > 0 && bytes.at(-1) === 10, 'no events, or last line has no end')
  const lines: Uint8Array[] = []
  for (let start = 0; start < bytes.length;) {
    const end = bytes.indexOf(10, start)
    lines.push(bytes.subarray(start, end))
    start = end + 1
  }
  return lines
}

function readEvent(c: Case, line: Uint8Array, path: string): VerifiedEvent {
  const value = parseCanonical(line) as unknown
  checkEvent(value)
  const event: VerifiedEvent = { ...describeEvent(value, line), path }
  const { sequence, epoch, previous } = value
  need(sequence <= c.head.treeSize && epoch <= c.head.epoch, 'newer than the head')
  need((c.events.get(sequence)?.path ?? path) === path, 'the same sequence in another file')
  need(sequence !== 1 || previous === noPrevious, 'first event has a previous one')
  need(sequence !== c.head.treeSize || event.digest === c.head.lastDigest, 'last event is not the head’s')
  const [before, after] = [c.events.get(sequence - 1), c.events.get(sequence + 1)]
  if (before) need(follows(before, event), 'does not follow the event before')
  if (after) need(follows(event, after), 'the event after does not follow')
  c.events.set(sequence, event)
  return event
}

function follows(first: BuiltEvent, second: BuiltEvent): boolean {
  return second.event.previous === first.digest && first.event.time <= second.event.time
}

function checkFolderChains(
  c: Case,
  found: readonly VerifiedEvent[],
  subject: { kind: string; id: string },
): void {
  const filings = eventsOf(found, 'entry.run-filed')
  const runs = new Set(filings.map(({ payload }) => chainKey('run', payload.runId)))
  need(runs.size === filings.length, 'a run is filed twice')
  addChains(c, found, new Set([chainKey(subject.kind, subject.id), ...runs]))
  for (const { event, payload } of filings) {
    const chain = c.chains.get(chainKey('run', payload.runId)) ?? []
    const last = present(chain.at(-1), 'lacks the chain of a run')
    const ends = chain.length === payload.runSubjectSequence && last.digest === payload.runDigest
    need(ends, 'chain of the run does not end as filed')
    need(last.event.sequence < event.sequence, 'run goes on after it was filed')
  }
}

function addChains(c: Case, found: readonly VerifiedEvent[], allowed: ReadonlySet<string>): void {
  const chains = new Map<string, VerifiedEvent[]>()
  for (const item of found) {
    const key = chainKey(item.event.subject.kind, item.event.subject.id)
    chains.set(key, [...(chains.get(key) ?? []), item])
  }
  const right = chains.size === allowed.size && [...chains.keys()].every((key) => allowed.has(key))
  need(right, 'holds events of somebody else, or lacks a chain')
  for (const [key, chain] of chains) {
    need(!c.chains.has(key), 'the same chain stands in two places')
    c.chains.set(key, chain)
  }
  for (const [key, chain] of chains) {
    chain.forEach(({ event }, i) => {
      need(event.subjectSequence === i + 1, `chain of ${key} is not 1..n at ${i + 1}`)
      need(event.subjectPrevious === (chain[i - 1]?.digest ?? null), `chain of ${key} is broken at ${i + 1}`)
    })
  }
}

const placeKey = ({ sequence, leafHash }: LeafPlace) => `${sequence} ${leafHash}`

function checkProofs(
  c: Case,
  path: string,
  found: readonly VerifiedEvent[],
  bounds: readonly LeafPlace[],
): void {
  const proofs = parseJson(c.read(path)) as unknown
  checkForm(proofsForm, proofs)
  const due = [
    ...found.map((item) => ({ sequence: item.event.sequence, leafHash: item.leafHash })),
    ...bounds,
  ].map(placeKey)
  const have = proofs.map(placeKey)
  const [dueCount, haveCount] = [countOf(due), countOf(have)]
  const stray = [...have, ...due].find((key) => !haveCount.has(key) || !dueCount.has(key))
  need(stray === undefined, `not one for each event and lower bound: ${stray}`)
  need(
    [...haveCount].every(([key, times]) => times <= (dueCount.get(key) ?? 0)),
    'a proof stands twice',
  )
  for (const proof of proofs) {
    c.report.check('inclusion proof', `${path} sequence ${proof.sequence}`, () => checkProof(c, proof))
  }
}

function countOf(keys: readonly string[]): Map<string, number> {
  const counts = new Map<string, number>()
  for (const key of keys) counts.set(key, (counts.get(key) ?? 0) + 1)
  return counts
}

function checkProof(c: Case, proof: Proofs[number]): void {
  const root = rootOfInclusion(
    fromHex(proof.leafHash),
    proof.sequence - 1,
    c.head.treeSize,
    proof.path.map(fromHex),
  )
  need(root !== null && toHex(root) === c.head.rootHash, 'does not lead to the head')
}

/** Times and epochs do not fall along the sequence, and nothing is later than the head. */
export function checkLedgerTimes(c: Case): void {
  c.report.check('ledger times', 'data/', () => {
    const events = [...c.events.values()].map(({ event }) => event).sort((a, b) => a.sequence - b.sequence)
    events.forEach((event, i) => {
      const before = events[i - 1]
      need(
        !before || (before.time <= event.time && before.epoch <= event.epoch),
        `time falls at sequence ${event.sequence}`,
      )
    })
    const last = events.at(-1)
    need(!last || last.time <= c.head.time, 'an event is later than the head')
  })
}

import { createHash } from 'node:crypto'
import { describe, expect, test } from 'vitest'
import type { LedgerEventView } from '../../server/contract/ledger.ts'
import { buildEvent, noPrevious } from '../../server/ledger-format/event.ts'
import { fromHex, toHex } from '../../server/ledger-format/digest.ts'
import { MerkleTree } from '../../server/ledger-format/merkle.ts'
import { checkEventHere } from '../../src/features/ledger/check-event.ts'
import { actorWords, eventWords } from '../../src/features/ledger/event-words.ts'
import { resultWords, standingOf, type Verification } from '../../src/features/ledger/standing.ts'

const uuid = (n: number) => `00000000-0000-4000-8000-${String(n).padStart(12, '0')}`

/** A small chain with its tree; every event as the interface shows it. */
function chain(length: number) {
  const views: LedgerEventView[] = []
  let previous = noPrevious
  for (let sequence = 1; sequence <= length; sequence++) {
    const built = buildEvent({
      epoch: 1,
      sequence,
      time: new Date(Date.UTC(2026, 10, 12, 9, 0, sequence)).toISOString(),
      actor: { kind: 'person', id: uuid(1), onBehalfOf: null },
      action: 'person.signed-in',
      subject: { kind: 'person', id: uuid(1) },
      subjectSequence: sequence,
      subjectPrevious: sequence === 1 ? null : previous,
      payload: { at: 'desk' },
      previous,
    })
    previous = built.digest
    views.push({ ...built.event, digest: built.digest, leafHash: built.leafHash } as LedgerEventView)
  }
  const tree = new MerkleTree(views.map((view) => fromHex(view.leafHash)))
  return { views, tree, head: { treeSize: length, rootHash: toHex(tree.root()) } }
}

describe('an event checked in the browser', () => {
  const { views, tree, head } = chain(7)
  const proofOf = (view: LedgerEventView) => ({
    leafHash: view.leafHash,
    ...head,
    path: tree.inclusionPath(view.sequence - 1).map(toHex),
  })

  test('every event of the tree holds', () => {
    for (const view of views)
      expect(checkEventHere(view, proofOf(view), head)).toEqual({ digest: true, inclusion: true })
  })

  test('the digest is SHA-256 of the canonical event, by another implementation too', () => {
    const { digest, leafHash: _leaf, ...event } = views[2]!
    // Members in code-unit order are RFC 8785's; this event has plain names and values.
    const sorted = (value: unknown): unknown =>
      value && typeof value === 'object'
        ? Object.fromEntries(
            Object.entries(value)
              .sort(([a], [b]) => (a < b ? -1 : 1))
              .map(([k, v]) => [k, sorted(v)]),
          )
        : value
    expect(
      createHash('sha256')
        .update(JSON.stringify(sorted(event)))
        .digest('hex'),
    ).toBe(digest)
  })

  test('a changed payload is found, though the server gives the old digest and proof', () => {
    const view = views[3]!
    const changed = { ...view, payload: { at: 'home' } }
    expect(checkEventHere(changed, proofOf(view), head)).toEqual({ digest: false, inclusion: false })
  })

  test('a proof for another place, or of another head, does not hold', () => {
    const view = views[3]!
    expect(checkEventHere(view, proofOf(views[4]!), head).inclusion).toBe(false)
    expect(checkEventHere(view, proofOf(view), { ...head, rootHash: '0'.repeat(64) }).inclusion).toBe(false)
    expect(checkEventHere(view, proofOf(view), { ...head, treeSize: 6 }).inclusion).toBe(false)
  })
})

describe('words', () => {
  test('an author signs, a witness countersigns', () => {
    expect(eventWords({ action: 'entry.signed', payload: { meaning: 'authorship' } })).toBe('Signed')
    expect(eventWords({ action: 'entry.signed', payload: { meaning: 'witness-read' } })).toBe('Countersigned')
    expect(eventWords({ action: 'something.new', payload: {} })).toBe('something.new')
  })
  test('a script acts for its owner', () => {
    const actor = { kind: 'token' as const, id: uuid(3), onBehalfOf: uuid(1) }
    expect(actorWords({ actor, actorName: 'Maren Adeyemi' })).toBe('Script of Maren Adeyemi')
  })
})

describe('standing', () => {
  const verification = (over: Partial<Verification>): Verification => ({
    holds: true,
    events: 4812,
    firstBroken: null,
    rootHash: null,
    head: 'matches',
    checkedAt: '2026-11-13T09:05:00.000Z',
    durationS: 2.4,
    detail: 'Every link matches.',
    ...over,
  })

  test('the result says whether the chain holds, or where it breaks', () => {
    expect(resultWords(verification({}))).toBe('The chain holds')
    const broken = verification({
      holds: false,
      firstBroken: { sequence: 4804, detail: 'its digest differs' },
    })
    expect(resultWords(broken)).toMatch(/^The chain breaks at event 4\D?804$/)
    expect(resultWords(verification({ holds: false, head: 'differs' }))).toBe(
      'The chain and the head do not agree',
    )
  })

  test('before, at and after a break, and beyond the head', () => {
    const broken = verification({ holds: false, firstBroken: { sequence: 5, detail: '' } })
    expect([4, 5, 6].map((sequence) => standingOf(sequence, broken, 10).state)).toEqual([
      'ok',
      'fault',
      'note',
    ])
    expect(standingOf(10, undefined, 10).state).toBe('ok')
    expect(standingOf(11, undefined, 10).words).toBe('not yet under a head')
    expect(standingOf(1, undefined, null).state).toBe('queued')
  })
})

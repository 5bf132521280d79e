import { describe, expect, it } from 'vitest'
import {
  buildEvent,
  ChainChecker,
  fromHex,
  noPrevious,
  rootOf,
  toHex,
  verifyChain,
  type BuiltEvent,
  type LedgerEvent,
} from '../../server/ledger-format/index.ts'

const id = (n: number) => `00000000-0000-4000-8000-${String(n).padStart(12, '0')}`

/** A ledger of revisions of three entries in turn. */
function ledger(size: number): BuiltEvent[] {
  const events: BuiltEvent[] = []
  for (let n = 1; n <= size; n++) {
    const before = events.filter(({ event }) => event.subject.id === id(n % 3)).at(-1)
    events.push(
      buildEvent({
        epoch: 1,
        sequence: n,
        time: new Date(Date.UTC(2026, 2, 2, 9, 0, n)).toISOString(),
        actor: { kind: 'person', id: id(9), onBehalfOf: null },
        action: 'entry.revised',
        subject: { kind: 'entry', id: id(n % 3) },
        subjectSequence: (before?.event.subjectSequence ?? 0) + 1,
        subjectPrevious: before?.digest ?? null,
        payload: { revision: n, contentSha256: 'a'.repeat(64), cause: 'pause' },
        previous: events.at(-1)?.digest ?? noPrevious,
      }),
    )
  }
  return events
}
const rows = (events: readonly BuiltEvent[]) =>
  events.map(({ event, digest, leafHash }) => ({ event, digest, leafHash }))

describe('a whole ledger', () => {
  it('holds, with root and last digest', () => {
    const events = ledger(20)
    expect(verifyChain(rows(events))).toEqual({
      treeSize: 20,
      rootHash: toHex(rootOf(events.map((event) => fromHex(event.leafHash)))),
      lastDigest: events.at(-1)?.digest,
      firstBroken: null,
    })
    expect(verifyChain([])).toMatchObject({ treeSize: 0, lastDigest: noPrevious, firstBroken: null })
  })

  it('tells the roots of earlier heads', () => {
    const events = ledger(20)
    const checker = new ChainChecker(new Set([7, 20]))
    for (const row of rows(events)) checker.add(row)
    expect(checker.rootAt(7)).toBe(toHex(rootOf(events.slice(0, 7).map((event) => fromHex(event.leafHash)))))
    expect(checker.rootAt(8)).toBeUndefined()
  })

  const changed = (at: number, change: Partial<LedgerEvent>) =>
    rows(ledger(9)).map((row, i) => (i + 1 === at ? { ...row, event: { ...row.event, ...change } } : row))

  it.each([
    [
      'an altered payload',
      5,
      changed(5, { payload: { revision: 6, contentSha256: 'a'.repeat(64), cause: 'pause' } }),
    ],
    ['a payload of another form', 5, changed(5, { payload: { revision: 5 } })],
    ['a member more', 5, changed(5, { note: 1 } as Partial<LedgerEvent>)],
    ['a time that falls', 5, changed(5, { time: '2026-03-02T09:00:00.000Z' })],
    ['another actor', 5, changed(5, { actor: { kind: 'system', id: null, onBehalfOf: null } })],
    ['a left-out event', 5, rows(ledger(9)).filter((_, i) => i !== 4)],
    [
      'two events exchanged',
      4,
      rows(ledger(9)).map((row, i, all) => (i === 3 ? all[4] : i === 4 ? all[3] : row) ?? row),
    ],
    ['a chain begun in the middle', 1, rows(ledger(9)).slice(1)],
    [
      'a stored digest that differs',
      5,
      rows(ledger(9)).map((row, i) => (i === 4 ? { ...row, digest: 'b'.repeat(64) } : row)),
    ],
    [
      'a stored leaf hash that differs',
      5,
      rows(ledger(9)).map((row, i) => (i === 4 ? { ...row, leafHash: 'b'.repeat(64) } : row)),
    ],
  ])('with %s is broken first at event %d', (_, sequence, events) => {
    expect(verifyChain(events).firstBroken?.sequence).toBe(sequence)
  })

  it('finds an event rewritten together with all digests after it, in the chain of its subject', () => {
    // Whoever rewrites event 5 alone and its own digests still contradicts the `previous` of event 6.
    const events = ledger(9)
    const fifth = events[4]
    if (!fifth) throw new Error('no event')
    const forged = buildEvent({
      ...fifth.event,
      payload: { revision: 99, contentSha256: 'a'.repeat(64), cause: 'pause' },
    })
    const result = verifyChain(rows(events.map((event) => (event === fifth ? forged : event))))
    expect(result.firstBroken).toEqual({ sequence: 6, detail: 'does not continue the event before' })
  })

  it('refuses to build an event that does not fit its action', () => {
    const [first] = ledger(1)
    if (!first) throw new Error('no event')
    expect(() => buildEvent({ ...first.event, payload: { revision: '1' } })).toThrow('/payload/revision')
    expect(() => buildEvent({ ...first.event, payload: {}, action: 'person.signed-in' })).not.toThrow()
    expect(() => buildEvent({ ...first.event, time: '2026-03-02' })).toThrow('/time')
  })
})

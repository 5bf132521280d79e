import { canonicalBytes } from './canonical-json.ts'
import { fromHex, toHex } from './digest.ts'
import { checkEvent, describeEvent, noPrevious, type BuiltEvent, type LedgerEvent } from './event.ts'
import { appendLeaf, emptyFrontier, rootOfFrontier } from './merkle.ts'

/** An event as the ledger's table has it: the document, and the digests stored beside it when there are any. */
export interface StoredEvent {
  event: unknown
  digest?: string
  leafHash?: string
}

export interface ChainResult {
  /** Events checked, up to the first that does not hold. */
  treeSize: number
  /** Root over them, hex. */
  rootHash: string
  lastDigest: string
  firstBroken: { sequence: number; detail: string } | null
}

/**
 * Checks a whole ledger from its first event, one event at a time: form, position, the digest of the event before, the
 * chain of each subject, times that do not fall, and the stored digests. Stops at the first event that does not hold.
 */
export class ChainChecker {
  private frontier = emptyFrontier
  private last: BuiltEvent | null = null
  private broken: ChainResult['firstBroken'] = null
  private readonly subjects = new Map<string, BuiltEvent>()
  private readonly roots = new Map<number, string>()

  /** @param sizes tree sizes at which the root is wanted (`rootAt`), for example those of the heads. */
  constructor(private readonly sizes: ReadonlySet<number> = new Set()) {}

  /** Takes the next event; answers false once an event did not hold. */
  add(row: StoredEvent): boolean {
    if (this.broken) return false
    try {
      this.accept(row)
    } catch (error) {
      this.broken = { sequence: this.frontier.size + 1, detail: (error as Error).message }
    }
    return this.broken === null
  }

  result(): ChainResult {
    return {
      treeSize: this.frontier.size,
      rootHash: toHex(rootOfFrontier(this.frontier)),
      lastDigest: this.last?.digest ?? noPrevious,
      firstBroken: this.broken,
    }
  }

  /** Root of a tree size that was asked for and reached. */
  rootAt(size: number): string | undefined {
    return this.roots.get(size)
  }

  private accept(row: StoredEvent): void {
    checkEvent(row.event)
    const event = row.event
    const subject = `${event.subject.kind} ${event.subject.id}`
    this.checkPlace(event)
    checkSubject(event, this.subjects.get(subject))
    const built = describeEvent(event, canonicalBytes(event))
    if (row.digest !== undefined && row.digest !== built.digest)
      throw new Error('the stored digest is another')
    if (row.leafHash !== undefined && row.leafHash !== built.leafHash)
      throw new Error('the stored leaf hash is another')
    this.last = built
    this.subjects.set(subject, built)
    this.frontier = appendLeaf(this.frontier, fromHex(built.leafHash))
    if (this.sizes.has(this.frontier.size))
      this.roots.set(this.frontier.size, toHex(rootOfFrontier(this.frontier)))
  }

  private checkPlace(event: LedgerEvent): void {
    const { last } = this
    if (event.sequence !== this.frontier.size + 1) throw new Error(`sequence ${event.sequence} stands here`)
    if (event.previous !== (last?.digest ?? noPrevious)) throw new Error('does not continue the event before')
    if (last && event.time < last.event.time)
      throw new Error('its time is earlier than that of the event before')
    if (last && event.epoch < last.event.epoch)
      throw new Error('its epoch is lower than that of the event before')
  }
}

function checkSubject(event: LedgerEvent, before: BuiltEvent | undefined): void {
  if (event.subjectSequence !== (before?.event.subjectSequence ?? 0) + 1)
    throw new Error('the chain of its subject has a gap')
  if (event.subjectPrevious !== (before?.digest ?? null))
    throw new Error('does not continue the chain of its subject')
}

/** Checks events in memory, in order from the first. */
export function verifyChain(events: Iterable<StoredEvent>): ChainResult {
  const checker = new ChainChecker()
  for (const row of events) if (!checker.add(row)) break
  return checker.result()
}

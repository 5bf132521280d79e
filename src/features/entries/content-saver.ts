import { ApiProblem, mayPass } from '../../lib/api-problem.ts'
import type { NormalDocument } from '../../../server/document/document.ts'

/** Changes reach the server this long after the first unsaved keystroke, so that a lost tab costs less than two seconds. */
const saveAfterMs = 1500
const retryAfterMs = [1000, 2000, 4000, 8000, 15_000, 30_000]
/** Browsers let a request outlive its page only below 64 KiB, counted over all of them. */
const keepaliveLimit = 60_000

export type SaveState =
  | { name: 'saved'; at: string | null }
  | { name: 'unsaved' }
  | { name: 'saving' }
  /** No answer: it tries again by itself. */
  | { name: 'offline'; since: number; attempts: number; nextTryAt: number; problem: ApiProblem }
  /** Somebody saved another text since ours was read; nothing is sent until the person chooses. */
  | { name: 'conflict' }
  /** The server will not take this text; trying again cannot help. */
  | { name: 'refused'; problem: ApiProblem }

export interface SaverPorts {
  put(
    document: NormalDocument,
    ifMatch: string,
    keepalive: boolean,
  ): Promise<{ etag: string; savedAt: string }>
  /** ETag of what the server has now. */
  currentEtag(): Promise<string>
  cutRevision(cause: 'leaving' | 'pause', keepalive: boolean): Promise<void>
}

/**
 * Keeps the text of one sheet saved. It never overwrites what somebody else saved: every save names the text it follows
 * (If-Match), and after a refusal only an explicit choice goes on.
 */
export class ContentSaver {
  private readonly ports: SaverPorts
  private document: () => NormalDocument
  private etag: string
  private state: SaveState
  private dirty = false
  private savedSinceRevision = false
  private inFlight: Promise<void> | null = null
  private timer: ReturnType<typeof setTimeout> | null = null
  private readonly listeners = new Set<() => void>()

  /** @param document gives the text as it stands on the screen */
  constructor(ports: SaverPorts, etag: string, document: () => NormalDocument) {
    this.ports = ports
    this.document = document
    this.etag = etag
    this.state = { name: 'saved', at: null }
  }

  readonly getState = (): SaveState => this.state

  readonly subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener)
    return () => this.listeners.delete(listener)
  }

  /** From now on the text is read so. */
  readFrom(document: () => NormalDocument): void {
    this.document = document
  }

  /** ETag of the text that the screen follows. */
  getEtag(): string {
    return this.etag
  }

  /** Whether the screen holds something that the server has not confirmed. */
  hasUnsaved(): boolean {
    return this.dirty || this.inFlight !== null
  }

  /** To be told of every change of the text. */
  changed(): void {
    this.dirty = true
    if (this.state.name === 'saved') this.become({ name: 'unsaved' })
    if (this.state.name === 'refused') this.become({ name: 'unsaved' })
    if (this.state.name === 'unsaved') this.schedule(saveAfterMs)
  }

  /** Saves now what is unsaved; resolves when that has been tried. */
  async flush(): Promise<void> {
    if (this.inFlight) await this.inFlight
    if (this.dirty && this.state.name !== 'conflict' && this.state.name !== 'refused') await this.save(false)
  }

  /** Tries at once what is waiting for the server to come back. */
  retryNow(): Promise<void> {
    return this.save(false)
  }

  /** The page may be gone in a moment: sends what is unsaved in a request that outlives it, else asks for a revision. */
  pageHides(): void {
    if (this.state.name === 'conflict' || this.state.name === 'refused') return
    if (this.dirty && !this.inFlight) void this.save(true)
    else if (!this.dirty && !this.inFlight) this.revise(true)
  }

  /** The sheet is left for another place in the program. */
  async leave(): Promise<void> {
    await this.flush()
    this.clearTimer()
    if (!this.dirty) this.revise(false)
  }

  /** Saves this text over the one of somebody else, which becomes a revision of its own first: the person's choice. */
  async saveMineOnTop(): Promise<void> {
    try {
      await this.ports.cutRevision('pause', false)
      this.etag = await this.ports.currentEtag()
    } catch (error) {
      this.failed(error)
      return
    }
    this.dirty = true
    await this.save(false)
  }

  /** The screen now shows the text that carries this ETag. */
  adopt(etag: string): void {
    this.etag = etag
    this.dirty = false
    this.clearTimer()
    this.become({ name: 'saved', at: null })
  }

  private save(keepalive: boolean): Promise<void> {
    this.clearTimer()
    this.inFlight ??= this.send(keepalive).finally(() => {
      this.inFlight = null
      if (this.dirty && this.state.name === 'unsaved') this.schedule(saveAfterMs)
    })
    return this.inFlight
  }

  private async send(keepalive: boolean): Promise<void> {
    const document = this.document()
    this.dirty = false
    if (this.state.name !== 'offline') this.become({ name: 'saving' })
    try {
      const small = keepalive && new Blob([JSON.stringify(document)]).size < keepaliveLimit
      const { etag, savedAt } = await this.ports.put(document, this.etag, small)
      this.etag = etag
      this.savedSinceRevision = true
      this.become(this.dirty ? { name: 'unsaved' } : { name: 'saved', at: savedAt })
    } catch (error) {
      this.dirty = true
      this.failed(error)
    }
  }

  private failed(error: unknown): void {
    if (error instanceof ApiProblem && error.status === 412) this.become({ name: 'conflict' })
    else if (error instanceof ApiProblem && mayPass(error)) this.goOffline(error)
    else this.become({ name: 'refused', problem: asProblem(error) })
  }

  private goOffline(problem: ApiProblem): void {
    const before = this.state.name === 'offline' ? this.state : null
    const attempts = (before?.attempts ?? 0) + 1
    const wait = retryAfterMs[Math.min(attempts, retryAfterMs.length) - 1] ?? 30_000
    this.become({
      name: 'offline',
      since: before?.since ?? Date.now(),
      attempts,
      nextTryAt: Date.now() + wait,
      problem,
    })
    this.schedule(wait)
  }

  private revise(keepalive: boolean): void {
    if (!this.savedSinceRevision) return
    this.savedSinceRevision = false
    this.ports.cutRevision('leaving', keepalive).catch(() => {
      // The saves are kept all the same; the server cuts the revision at the next occasion.
      this.savedSinceRevision = true
    })
  }

  private schedule(ms: number): void {
    this.timer ??= setTimeout(() => {
      this.timer = null
      void this.save(false)
    }, ms)
  }

  private clearTimer(): void {
    if (this.timer !== null) clearTimeout(this.timer)
    this.timer = null
  }

  private become(state: SaveState): void {
    this.state = state
    for (const listener of this.listeners) listener()
  }
}

function asProblem(error: unknown): ApiProblem {
  if (error instanceof ApiProblem) return error
  return new ApiProblem({
    code: 'internal',
    status: 0,
    title: 'The text could not be sent',
    detail: error instanceof Error ? error.message : 'The text could not be sent.',
  })
}

import type { RawFile } from '../../../server/contract/files.ts'
import { sentenceOf } from '../../lib/api-problem.ts'
import { upload, type UploadProgress } from '../../lib/upload.ts'

export interface Upload {
  key: number
  name: string
  size: number
  sent: number
  /** Bytes per second over the last seconds; null until it can be told. */
  rate: number | null
  state: 'waiting' | 'sending' | 'checking' | 'refused' | 'stopped'
  /** Why it was refused, and what is safe. */
  sentence: string | null
}

export type UploadTarget = { name: 'uploadToEntry' | 'uploadToRun'; id: string }

export interface UploadPorts {
  /** Where a file goes; asked when its turn comes, because a run may have to be made first. */
  target(file: File): Promise<UploadTarget>
  stored(file: RawFile): void
  send?: typeof upload
  now?: () => number
}

/** Files on their way to the laboratory's store, one after the other: two at once would only halve the rate of each. */
export class UploadList {
  private uploads: readonly Upload[] = []
  private readonly waiting: { key: number; file: File }[] = []
  private readonly stops = new Map<number, AbortController>()
  private readonly listeners = new Set<() => void>()
  private busy = false
  private count = 0
  private ports: UploadPorts

  constructor(ports: UploadPorts) {
    this.ports = ports
  }

  readonly getUploads = (): readonly Upload[] => this.uploads

  readonly subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener)
    return () => this.listeners.delete(listener)
  }

  /** From now on files go where these ports say. */
  serve(ports: UploadPorts): void {
    this.ports = ports
  }

  /** Takes files; what cannot be a record is refused at once, with the reason. */
  add(files: Iterable<File>): void {
    for (const file of files) {
      const key = ++this.count
      const empty = file.size === 0
      const sentence = empty
        ? `${file.name} is empty: it holds not a single byte. Nothing was uploaded.`
        : null
      const state = empty ? 'refused' : 'waiting'
      this.uploads = [
        ...this.uploads,
        { key, name: file.name, size: file.size, sent: 0, rate: null, state, sentence },
      ]
      if (!empty) this.waiting.push({ key, file })
    }
    this.tell()
    void this.work()
  }

  /** Stops an upload; nothing of it is kept. */
  stop(key: number): void {
    this.stops.get(key)?.abort()
    const at = this.waiting.findIndex((each) => each.key === key)
    if (at >= 0) {
      this.waiting.splice(at, 1)
      this.change(key, { state: 'stopped' })
    }
  }

  /** Takes a line that has ended out of the list. */
  dismiss(key: number): void {
    this.uploads = this.uploads.filter((each) => each.key !== key)
    this.tell()
  }

  private async work(): Promise<void> {
    if (this.busy) return
    this.busy = true
    for (let next = this.waiting.shift(); next; next = this.waiting.shift())
      await this.sendOne(next.key, next.file)
    this.busy = false
  }

  private async sendOne(key: number, file: File): Promise<void> {
    const stop = new AbortController()
    this.stops.set(key, stop)
    this.change(key, { state: 'sending' })
    try {
      const target = await this.ports.target(file)
      stop.signal.throwIfAborted()
      const onProgress = this.measure(key)
      const stored = await (this.ports.send ?? upload)(target.name, {
        id: target.id,
        file,
        signal: stop.signal,
        onProgress,
      })
      this.dismiss(key)
      this.ports.stored(stored)
    } catch (error) {
      if (stop.signal.aborted) this.change(key, { state: 'stopped' })
      else this.change(key, { state: 'refused', sentence: sentenceOf(error) })
    } finally {
      this.stops.delete(key)
    }
  }

  /** Follows the bytes sent and their rate, smoothed over about three seconds. */
  private measure(key: number): (progress: UploadProgress) => void {
    const now = this.ports.now ?? (() => performance.now())
    let last = { at: now(), sent: 0 }
    let rate: number | null = null
    return ({ sent, total }) => {
      const seconds = (now() - last.at) / 1000
      if (seconds >= 0.25) {
        const current = (sent - last.sent) / seconds
        const weight = rate === null ? 1 : 1 - Math.exp(-seconds / 3)
        rate = (rate ?? 0) + weight * (current - (rate ?? 0))
        last = { at: now(), sent }
      }
      this.change(key, { sent, rate, state: sent >= total ? 'checking' : 'sending' })
    }
  }

  private change(key: number, change: Partial<Upload>): void {
    this.uploads = this.uploads.map((each) => (each.key === key ? { ...each, ...change } : each))
    this.tell()
  }

  private tell(): void {
    for (const listener of this.listeners) listener()
  }
}

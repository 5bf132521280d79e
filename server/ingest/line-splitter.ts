import { UnreadableFile, grouped } from './unreadable-file.ts'

/** One line without its line feed: bytes[start, end) is its text. */
export type TakeLine = (bytes: Uint8Array, start: number, end: number) => void

const lineFeed = 0x0a
const longestLine = 65_536

/** Cuts pieces of a file into lines, without copying but at the seams. */
export class LineSplitter {
  /** Line that was handed out last, from 1. */
  line = 0
  private rest: Uint8Array = new Uint8Array(0)

  constructor(private readonly take: TakeLine) {}

  push(chunk: Uint8Array): void {
    let start = 0
    if (this.rest.length > 0) {
      const end = chunk.indexOf(lineFeed)
      this.rest = joined(this.rest, chunk.subarray(0, end < 0 ? chunk.length : end))
      this.checkLength(this.rest.length)
      if (end < 0) return
      const whole = this.rest
      this.rest = new Uint8Array(0)
      this.hand(whole, 0, whole.length)
      start = end + 1
    }
    for (;;) {
      const end = chunk.indexOf(lineFeed, start)
      if (end < 0) break
      this.checkLength(end - start)
      this.hand(chunk, start, end)
      start = end + 1
    }
    this.checkLength(chunk.length - start)
    if (start < chunk.length) this.rest = new Uint8Array(chunk.subarray(start))
  }

  /** The last line when no line feed ends it; null when there is none. */
  end(): Uint8Array | null {
    if (this.rest.length === 0) return null
    this.line += 1
    return this.rest
  }

  private hand(bytes: Uint8Array, start: number, end: number): void {
    this.line += 1
    this.take(bytes, start, end)
  }

  private checkLength(length: number): void {
    if (length <= longestLine) return
    const line = this.line + 1
    throw new UnreadableFile(
      `Line ${grouped(line)} is longer than ${grouped(longestLine)} bytes: this is not a table of numbers in lines.`,
      { line, found: 'a longer line', expected: `lines of at most ${longestLine} bytes` },
    )
  }
}

export function joined(a: Uint8Array, b: Uint8Array): Uint8Array {
  const both = new Uint8Array(a.length + b.length)
  both.set(a)
  both.set(b, a.length)
  return both
}

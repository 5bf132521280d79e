import { z } from 'zod'
import type { Parser, Reading } from '../reading.ts'
import { notText } from '../text.ts'
import { UnreadableFile } from '../unreadable-file.ts'

export const otherOptions = z.strictObject({})

/** A file that is kept as it is and not read: a picture, a document, a format not known here. */
export class OtherParser implements Parser {
  private why: string | null = null
  private empty = true

  push(chunk: Uint8Array): void {
    if (chunk.length === 0) return
    if (this.empty) this.why = notText(chunk)
    this.empty = false
  }

  finish(): Reading {
    if (this.empty) throw new UnreadableFile('The file is empty.')
    return { kind: 'other', detail: `${this.why ?? 'No rows of numbers were found.'} It is kept as it is.` }
  }
}

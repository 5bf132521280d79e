/** A document that the schema does not admit. `pointer` is a JSON pointer into it, `detail` a sentence. */
export class DocumentError extends Error {
  readonly pointer: string
  readonly detail: string

  constructor(pointer: string, detail: string) {
    super(`${pointer || '/'}: ${detail}`)
    this.name = 'DocumentError'
    this.pointer = pointer
    this.detail = detail
  }
}

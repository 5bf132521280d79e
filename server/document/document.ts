import { getSchema } from '@tiptap/core'
import type { Schema } from '@tiptap/pm/model'
import { documentExtensions } from './extensions.ts'

/** The ProseMirror schema of a sheet's text. */
export const documentSchema: Schema = getSchema(documentExtensions)

export interface DocumentMark {
  type: string
  attrs?: Record<string, unknown>
}

export interface DocumentNode {
  type: string
  attrs?: Record<string, unknown>
  content?: DocumentNode[]
  marks?: DocumentMark[]
  text?: string
}

/** A document that passed `checkDocument`: the schema's own JSON, ids complete and unique. */
export interface NormalDocument extends DocumentNode {
  type: 'doc'
  content: DocumentNode[]
}

/** The text of a fresh sheet: one empty paragraph. */
export function emptyDocument(): NormalDocument {
  return { type: 'doc', content: [{ type: 'paragraph', attrs: { id: 'start' } }] }
}

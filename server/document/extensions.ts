import type { Extensions } from '@tiptap/core'
import { TableKit } from '@tiptap/extension-table'
import { UniqueID } from '@tiptap/extension-unique-id'
import StarterKit from '@tiptap/starter-kit'
import { Calculation, QuotedResult } from './nodes/calculation.ts'
import { Image } from './nodes/image.ts'
import { Link } from './nodes/link.ts'
import { MathBlock, MathInline } from './nodes/maths.ts'
import { Subscript, Superscript } from './nodes/script-marks.ts'

/** Nodes that carry `attrs.id`: every block, and the quoted result. */
export const nodesWithId = [
  'paragraph',
  'heading',
  'bulletList',
  'orderedList',
  'listItem',
  'blockquote',
  'codeBlock',
  'horizontalRule',
  'table',
  'tableRow',
  'tableHeader',
  'tableCell',
  'image',
  'mathBlock',
  'calculation',
  'quotedResult',
]

/** Nodes that the editor draws by itself: it extends these with node views and leaves the schema alone. */
export const drawnNodes = { Image, MathInline, MathBlock, Calculation, QuotedResult }

/** What the text of a sheet is made of, without the nodes of `drawnNodes`. */
export const plainExtensions: Extensions = [
  // No trailing node: opening a sheet must never change its text.
  StarterKit.configure({
    link: false,
    heading: { levels: [1, 2, 3] },
    dropcursor: { color: false },
    trailingNode: false,
  }),
  TableKit.configure({ table: { resizable: false } }),
  Link,
  Subscript,
  Superscript,
  UniqueID.configure({ types: nodesWithId }),
]

/** Everything that defines the form of a sheet's text. */
export const documentExtensions: Extensions = [...plainExtensions, ...Object.values(drawnNodes)]

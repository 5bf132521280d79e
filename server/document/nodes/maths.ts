import { Node } from '@tiptap/core'
import { dataAttribute } from './data-attribute.ts'

/** A formula inside a sentence, kept as LaTeX. */
export const MathInline = Node.create({
  name: 'mathInline',
  group: 'inline',
  inline: true,
  atom: true,
  addAttributes: () => ({ latex: dataAttribute('latex', '') }),
  parseHTML: () => [{ tag: 'span[data-latex]' }],
  renderHTML: ({ HTMLAttributes }) => ['span', HTMLAttributes],
})

/** A displayed formula, kept as LaTeX. */
export const MathBlock = Node.create({
  name: 'mathBlock',
  group: 'block',
  atom: true,
  addAttributes: () => ({ latex: dataAttribute('latex', '') }),
  parseHTML: () => [{ tag: 'div[data-latex]' }],
  renderHTML: ({ HTMLAttributes }) => ['div', HTMLAttributes],
})

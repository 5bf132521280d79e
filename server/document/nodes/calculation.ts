import { Node } from '@tiptap/core'
import { dataAttribute } from './data-attribute.ts'

/** The place of a calculation in the text; what it shows is the calculation's own affair. */
export const Calculation = Node.create({
  name: 'calculation',
  group: 'block',
  atom: true,
  draggable: true,
  addAttributes: () => ({ calculationId: dataAttribute('calculation-id', null) }),
  parseHTML: () => [{ tag: 'div[data-calculation-id]' }],
  renderHTML: ({ HTMLAttributes }) => ['div', HTMLAttributes],
})

/** A figure of a calculation quoted in a sentence: `pointer` is a JSON pointer into its result. */
export const QuotedResult = Node.create({
  name: 'quotedResult',
  group: 'inline',
  inline: true,
  atom: true,
  addAttributes: () => ({
    calculationId: dataAttribute('calculation-id', null),
    pointer: dataAttribute('pointer', null),
  }),
  parseHTML: () => [{ tag: 'span[data-calculation-id]' }],
  renderHTML: ({ HTMLAttributes }) => ['span', HTMLAttributes],
})

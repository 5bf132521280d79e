import { Node } from '@tiptap/core'
import { dataAttribute } from './data-attribute.ts'

/** A picture of the entry's own files; its bytes never stand in the text. */
export const Image = Node.create({
  name: 'image',
  group: 'block',
  atom: true,
  draggable: true,

  addAttributes() {
    return {
      fileId: dataAttribute('file-id', null),
      alt: dataAttribute('alt', ''),
      caption: dataAttribute('caption', ''),
      width: {
        default: null,
        parseHTML: (element: HTMLElement) =>
          Number.parseInt(element.getAttribute('data-width') ?? '', 10) || null,
        renderHTML: ({ width }) => (width === null ? {} : { 'data-width': width }),
      },
    }
  },

  parseHTML: () => [{ tag: 'figure[data-file-id]' }],
  renderHTML: ({ HTMLAttributes }) => ['figure', HTMLAttributes],
})

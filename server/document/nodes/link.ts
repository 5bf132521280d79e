import { Mark, mergeAttributes } from '@tiptap/core'
import { isAllowedHref } from '../allowed-href.ts'

/** A link with nothing but its address: no targets, classes or titles in what is signed. */
export const Link = Mark.create({
  name: 'link',
  priority: 1000,
  inclusive: false,

  addAttributes() {
    return { href: { default: null } }
  },

  parseHTML() {
    return [
      {
        tag: 'a[href]',
        getAttrs: (element) => (isAllowedHref(element.getAttribute('href') ?? '') ? null : false),
      },
    ]
  },

  renderHTML({ HTMLAttributes }) {
    return ['a', mergeAttributes(HTMLAttributes, { rel: 'noopener noreferrer' }), 0]
  },
})

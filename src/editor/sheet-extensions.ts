import { Extension, InputRule, type Extensions } from '@tiptap/core'
import { Placeholder } from '@tiptap/extensions'
import { ReactNodeViewRenderer } from '@tiptap/react'
import { drawnNodes, plainExtensions } from '../../server/document/extensions.ts'
import { CalculationView } from './node-views/calculation-view.tsx'
import { ImageView } from './node-views/image-view.tsx'
import { MathBlockView, MathInlineView } from './node-views/maths-view.tsx'
import { QuotedResultView } from './node-views/quoted-result-view.tsx'

const { Image, MathInline, MathBlock, Calculation, QuotedResult } = drawnNodes

/** `$x$` and a space make a formula in the line, `$$x$$` and a space a displayed one. */
const MathsRules = Extension.create({
  name: 'mathsRules',
  addInputRules() {
    return [
      new InputRule({
        find: /(?:^|\s)\$\$([^$]+)\$\$\s$/,
        handler: ({ chain, range, match }) => {
          chain()
            .deleteRange(range)
            .insertContent({ type: 'mathBlock', attrs: { latex: match[1] } })
            .run()
        },
      }),
      new InputRule({
        find: /(^|\s)\$([^$\s](?:[^$]*[^$\s])?)\$\s$/,
        handler: ({ chain, range, match }) => {
          const content = [
            { type: 'mathInline', attrs: { latex: match[2] } },
            { type: 'text', text: ' ' },
          ]
          chain()
            .insertContentAt(range, match[1] ? [{ type: 'text', text: match[1] }, ...content] : content)
            .run()
        },
      }),
    ]
  },
})

/** The extensions of the document form, drawn, and what only writing needs. */
export const sheetExtensions: Extensions = [
  ...plainExtensions,
  Image.extend({ addNodeView: () => ReactNodeViewRenderer(ImageView) }),
  MathInline.extend({ addNodeView: () => ReactNodeViewRenderer(MathInlineView, { as: 'span' }) }),
  MathBlock.extend({ addNodeView: () => ReactNodeViewRenderer(MathBlockView) }),
  Calculation.extend({ addNodeView: () => ReactNodeViewRenderer(CalculationView) }),
  QuotedResult.extend({ addNodeView: () => ReactNodeViewRenderer(QuotedResultView, { as: 'span' }) }),
  MathsRules,
  Placeholder.configure({ placeholder: 'Write, press / to insert, or drop a file anywhere on the sheet.' }),
]

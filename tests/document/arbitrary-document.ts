import fc from 'fast-check'
import type { DocumentNode } from '../../server/document/index.ts'

const uuid = fc.uuid({ version: 4 })
const id = fc.option(fc.stringMatching(/^[a-z0-9]{1,4}$/), { nil: null })
const words = fc.string({ minLength: 1, unit: 'grapheme' }).filter((text) => !/\p{Surrogate}|\0/u.test(text))
const mark = fc.constantFrom('bold', 'italic', 'underline', 'strike')

const inline: fc.Arbitrary<DocumentNode> = fc.oneof(
  fc.record({
    type: fc.constant('text'),
    text: words,
    marks: fc.uniqueArray(mark, { maxLength: 3 }).map((types) => types.map((type) => ({ type }))),
  }),
  fc.constant({ type: 'hardBreak' }),
  words.map((latex) => ({ type: 'mathInline', attrs: { latex } })),
  fc.tuple(id, uuid).map(([own, calculationId]) => ({
    type: 'quotedResult',
    attrs: { id: own, calculationId, pointer: '/g2Zero' },
  })),
)

const sentence = fc.array(inline, { maxLength: 5 })

const { block } = fc.letrec<{ block: DocumentNode }>((tie) => ({
  block: fc.oneof(
    { maxDepth: 3 },
    fc.record({ type: fc.constant('paragraph'), attrs: fc.record({ id }), content: sentence }),
    fc.record({
      type: fc.constant('heading'),
      attrs: fc.record({ id, level: fc.integer({ min: 1, max: 3 }) }),
      content: sentence,
    }),
    fc
      .tuple(id, uuid)
      .map(([own, calculationId]) => ({ type: 'calculation', attrs: { id: own, calculationId } })),
    words.map((latex) => ({ type: 'mathBlock', attrs: { latex } })),
    fc.tuple(uuid, words).map(([fileId, caption]) => ({ type: 'image', attrs: { fileId, caption } })),
    fc
      .array(tie('block'), { minLength: 1, maxLength: 3 })
      .map((content) => ({ type: 'blockquote', content })),
    fc.array(sentence, { minLength: 1, maxLength: 3 }).map((items) => ({
      type: 'bulletList',
      content: items.map((content) => ({ type: 'listItem', content: [{ type: 'paragraph', content }] })),
    })),
  ),
}))

/** Documents that the schema admits, with ids missing or repeated. */
export const arbitraryDocument = fc
  .array(block, { minLength: 1, maxLength: 6 })
  .map((content) => ({ type: 'doc' as const, content }))

import { getSchema } from '@tiptap/core'
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import {
  checkDocument,
  documentExtensions,
  DocumentError,
  documentSchema,
  emptyDocument,
  nodesWithId,
  type DocumentNode,
} from '../../server/document/index.ts'
import { arbitraryDocument } from './arbitrary-document.ts'

const calculationId = '00000000-0000-4000-8000-00000000000a'
let count = 0
const newId = () => `n${++count}`
const doc = (...content: unknown[]) => ({ type: 'doc', content })
const paragraph = (...content: unknown[]) => ({ type: 'paragraph', content })
const refusal = (json: unknown) => {
  try {
    checkDocument(json, newId)
  } catch (error) {
    return error
  }
  return null
}

describe('what is admitted', () => {
  test('an empty document is its own normal form', () => {
    expect(checkDocument(emptyDocument(), newId)).toEqual(emptyDocument())
  })

  test('every block and every quoted result gets an id, and repeated ids are replaced', () => {
    const normal = checkDocument(
      doc(
        { type: 'paragraph', attrs: { id: 'a' } },
        { type: 'heading', attrs: { id: 'a', level: 2 }, content: [{ type: 'text', text: 'Rates' }] },
        paragraph({ type: 'quotedResult', attrs: { calculationId, pointer: '/g2' } }),
        { type: 'calculation', attrs: { calculationId } },
      ),
      newId,
    )
    const ids = normal.content.map((node) => node.attrs?.id)
    expect(ids[0]).toBe('a')
    expect(new Set([...ids, normal.content[2]?.content?.[0]?.attrs?.id]).size).toBe(5)
  })

  test('blocks of the schema and the list of nodes with an id agree (shapes.md 6)', () => {
    const blocks = Object.values(documentSchema.nodes).filter((type) => type.isBlock && type.name !== 'doc')
    expect([...blocks.map((type) => type.name), 'quotedResult'].sort()).toEqual([...nodesWithId].sort())
    expect(Object.keys(getSchema(documentExtensions).nodes)).toEqual(Object.keys(documentSchema.nodes))
  })

  test('any document of the schema keeps its normal form when checked again', () => {
    fc.assert(
      fc.property(arbitraryDocument, (json) => {
        const once = checkDocument(json, newId)
        expect(checkDocument(once, newId)).toEqual(once)
        expect(checkDocument(JSON.parse(JSON.stringify(once)), newId)).toEqual(once)
      }),
      { numRuns: 200 },
    )
  })
})

const hostile: [string, unknown, string][] = [
  ['a list', [], ''],
  ['null', null, ''],
  ['text at the top', doc({ type: 'text', text: 'x' }), ''],
  ['another top', paragraph({ type: 'text', text: 'x' }), '/type'],
  ['an unknown node', doc({ type: 'html', attrs: { html: '<script>' } }), '/content/0/type'],
  ['a node named like a member of every object', doc({ type: 'constructor' }), '/content/0/type'],
  ['an unknown member', doc({ type: 'paragraph', onclick: 'x' }), '/content/0/onclick'],
  ['an unknown attribute', doc({ type: 'paragraph', attrs: { style: 'x' } }), '/content/0/attrs'],
  ['an id that is an object', doc({ type: 'paragraph', attrs: { id: { a: 1 } } }), '/content/0/attrs/id'],
  ['an id with markup', doc({ type: 'paragraph', attrs: { id: '"><b>' } }), '/content/0/attrs/id'],
  ['a heading of level 9', doc({ type: 'heading', attrs: { level: 9 } }), '/content/0/attrs/level'],
  [
    'an unknown mark',
    doc(paragraph({ type: 'text', text: 'x', marks: [{ type: 'font' }] })),
    '/content/0/content/0/marks/0/type',
  ],
  [
    'a script link',
    doc(
      paragraph({
        type: 'text',
        text: 'x',
        marks: [{ type: 'link', attrs: { href: 'javascript:alert(1)' } }],
      }),
    ),
    '/content/0/content/0/marks/0/attrs/href',
  ],
  [
    'a data link',
    doc(
      paragraph({ type: 'text', text: 'x', marks: [{ type: 'link', attrs: { href: 'data:text/html,x' } }] }),
    ),
    '/content/0/content/0/marks/0/attrs/href',
  ],
  [
    'a link to another host by two slashes',
    doc(paragraph({ type: 'text', text: 'x', marks: [{ type: 'link', attrs: { href: '//evil.example' } }] })),
    '/content/0/content/0/marks/0/attrs/href',
  ],
  [
    'a link that opens elsewhere',
    doc(
      paragraph({
        type: 'text',
        text: 'x',
        marks: [{ type: 'link', attrs: { href: 'https://a.example', target: '_top' } }],
      }),
    ),
    '/content/0/content/0/marks/0/attrs',
  ],
  [
    'a calculation that names none',
    doc({ type: 'calculation', attrs: { calculationId: 'C1' } }),
    '/content/0/attrs/calculationId',
  ],
  [
    'a pointer that is none',
    doc(paragraph({ type: 'quotedResult', attrs: { calculationId, pointer: 'g2' } })),
    '/content/0/content/0/attrs/pointer',
  ],
  ['a formula that is no text', doc({ type: 'mathBlock', attrs: { latex: 7 } }), '/content/0/attrs/latex'],
  [
    'an image from outside',
    doc({ type: 'image', attrs: { fileId: calculationId, src: 'https://a.example/x.png' } }),
    '/content/0/attrs',
  ],
  [
    'a width that is no integer',
    doc({ type: 'image', attrs: { fileId: calculationId, width: 100.5 } }),
    '/content/0/attrs/width',
  ],
  ['half a character', doc(paragraph({ type: 'text', text: 'x\ud800' })), '/content/0/content/0/text'],
  ['an empty text', doc(paragraph({ type: 'text', text: '' })), '/content/0/content/0/text'],
  ['text on a paragraph', doc({ type: 'paragraph', text: 'x' }), '/content/0/text'],
  ['a block inside a sentence', doc(paragraph(paragraph())), ''],
  ['an empty document', doc(), ''],
  [
    'the same mark twice',
    doc(paragraph({ type: 'text', text: 'x', marks: [{ type: 'bold' }, { type: 'bold' }] })),
    '',
  ],
]

describe('what is refused', () => {
  test.each(hostile)('%s', (_, json, pointer) => {
    const error = refusal(json)
    expect(error).toBeInstanceOf(DocumentError)
    expect((error as DocumentError).pointer).toBe(pointer)
    expect((error as DocumentError).detail).toMatch(/\.$/)
  })

  test('text nested deeper than 100 levels, without an overflow at a million', () => {
    const nested = (levels: number) => {
      let node: DocumentNode = { type: 'paragraph' }
      for (let level = 0; level < levels; level++) node = { type: 'blockquote', content: [node] }
      return doc(node)
    }
    expect(refusal(nested(99))).toBeNull()
    expect(refusal(nested(100))).toBeInstanceOf(DocumentError)
    expect(refusal(nested(1_000_000))).toBeInstanceOf(DocumentError)
  })

  test('more parts or characters than a sheet can hold', () => {
    expect(refusal(doc(...Array.from({ length: 50_001 }, () => ({ type: 'paragraph' }))))).toBeInstanceOf(
      DocumentError,
    )
    expect(refusal(doc(paragraph({ type: 'text', text: 'x'.repeat(2_000_001) })))).toBeInstanceOf(
      DocumentError,
    )
  })

  test('random JSON is refused with DocumentError and never crashes', () => {
    const loose = fc.letrec((tie) => ({
      node: fc.record(
        {
          type: fc.oneof(fc.constantFrom(...Object.keys(documentSchema.nodes)), fc.string()),
          attrs: fc.oneof(
            fc.jsonValue(),
            fc.dictionary(fc.constantFrom('id', 'level', 'latex', 'href'), fc.jsonValue()),
          ),
          content: fc.oneof(fc.jsonValue(), fc.array(tie('node'), { maxLength: 4 })),
          marks: fc.jsonValue(),
          text: fc.jsonValue(),
        },
        { requiredKeys: ['type'] },
      ),
    })).node
    fc.assert(
      fc.property(
        fc.oneof(
          fc.jsonValue(),
          loose,
          loose.map((node) => doc(node)),
        ),
        (json) => {
          const error = refusal(json)
          if (error !== null) expect(error).toBeInstanceOf(DocumentError)
        },
      ),
      { numRuns: 2000 },
    )
  })
})

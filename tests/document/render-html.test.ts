// @vitest-environment jsdom
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import {
  calculationsIn,
  checkDocument,
  filesIn,
  plainText,
  quotesIn,
  renderHtml,
  type RenderParts,
} from '../../server/document/index.ts'
import { arbitraryDocument } from './arbitrary-document.ts'

const a = '00000000-0000-4000-8000-00000000000a'
const b = '00000000-0000-4000-8000-00000000000b'
const file = '00000000-0000-4000-8000-00000000000f'
let count = 0
const normal = (...content: unknown[]) => checkDocument({ type: 'doc', content }, () => `n${++count}`)
const parts: RenderParts = {
  calculation: (id) => `<p class="block">${id}</p>`,
  quote: () => '0.083 ± 0.011',
  image: (id) => `files/${id}.png`,
}
const text = (words: string, ...marks: object[]) => ({ type: 'text', text: words, marks })

const sheet = normal(
  { type: 'heading', attrs: { level: 1 }, content: [text('Purity')] },
  {
    type: 'paragraph',
    content: [
      text('At zero delay '),
      { type: 'mathInline', attrs: { latex: 'g^{(2)}(0)' } },
      text(' is '),
      { type: 'quotedResult', attrs: { id: 'q1', calculationId: b, pointer: '/g2Zero' } },
      text('.'),
    ],
  },
  { type: 'calculation', attrs: { calculationId: a } },
  { type: 'calculation', attrs: { calculationId: b } },
  { type: 'image', attrs: { fileId: file, alt: 'map', caption: 'Map of the chip' } },
)

describe('what stands in a text', () => {
  test('calculations in document order, placed and quoted, each once', () => {
    expect(calculationsIn(sheet)).toEqual([b, a])
  })
  test('quotes with their node, calculation and pointer', () => {
    expect(quotesIn(sheet)).toEqual([{ nodeId: 'q1', calculationId: b, pointer: '/g2Zero' }])
  })
  test('pictures', () => expect(filesIn(sheet)).toEqual([file]))
  test('words, a line a block', () => {
    expect(plainText(sheet, () => '0.083')).toBe(
      'Purity\nAt zero delay g^{(2)}(0) is 0.083.\nMap of the chip',
    )
  })
})

describe('static HTML', () => {
  const page = (html: string) => new DOMParser().parseFromString(html, 'text/html')

  test('headings begin at h2, formulae carry MathML, quotes and blocks are filled in', () => {
    const body = page(renderHtml(sheet, parts)).body
    expect(body.querySelector('h2')?.textContent).toBe('Purity')
    expect(body.querySelector('.katex math annotation')?.textContent).toBe('g^{(2)}(0)')
    expect(body.querySelector('#q1')?.textContent).toBe('0.083 ± 0.011')
    expect([...body.querySelectorAll('.calculation .block')].map((block) => block.textContent)).toEqual([
      a,
      b,
    ])
    expect(body.querySelector('figure img')?.getAttribute('src')).toBe(`files/${file}.png`)
  })

  test('markup in words, captions and formulae stays words', () => {
    const attack = '<img src=x onerror=alert(1)>"\'&'
    const body = page(
      renderHtml(
        normal(
          { type: 'paragraph', content: [text(attack, { type: 'bold' })] },
          { type: 'image', attrs: { fileId: file, alt: attack, caption: attack } },
          { type: 'mathBlock', attrs: { latex: attack } },
          { type: 'mathBlock', attrs: { latex: '\\href{javascript:alert(1)}{x}' } },
          { type: 'mathBlock', attrs: { latex: '\\def\\a{\\a\\a}\\a' } },
        ),
        parts,
      ),
    ).body
    expect(body.querySelectorAll('img[src=x], [onerror], a').length).toBe(0)
    expect(body.querySelector('strong')?.textContent).toBe(attack)
    expect(body.querySelector('figcaption')?.textContent).toBe(attack)
  })

  test('any document becomes HTML whose words are those of the document', () => {
    fc.assert(
      fc.property(arbitraryDocument, (json) => {
        const document = checkDocument(json, () => `x${++count}`)
        const body = page(renderHtml(document, parts)).body
        expect(body.querySelectorAll('script, iframe, [onclick]').length).toBe(0)
        expect(body.querySelectorAll('h2, h3, h4').length).toBe(
          document.content.flatMap(function headings(node): unknown[] {
            return [...(node.type === 'heading' ? [node] : []), ...(node.content ?? []).flatMap(headings)]
          }).length,
        )
      }),
      { numRuns: 60 },
    )
  })
})

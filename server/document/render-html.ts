import { isAllowedHref } from './allowed-href.ts'
import type { DocumentMark, DocumentNode, NormalDocument } from './document.ts'
import { mathsHtml } from './maths.ts'

/** What a rendition needs from outside the text. */
export interface RenderParts {
  /** Finished HTML of a calculation block; it is not escaped again. */
  calculation(calculationId: string): string
  /** Text of a quoted result by its node id. */
  quote(nodeId: string): string
  /** Address of a picture. */
  image(fileId: string): string
}

/** Text made harmless inside HTML text and quoted attributes. */
export function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (character) => `&#${character.charCodeAt(0)};`)
}

/** A sheet's text as static HTML, for print and bundle. Headings start at h2: the sheet's title is the h1. */
export function renderHtml(document: NormalDocument, parts: RenderParts): string {
  return inner(document, parts)
}

type Render = (node: DocumentNode, parts: RenderParts) => string

const renderers: Record<string, Render> = {
  text: (node) => (node.marks ?? []).reduceRight(wrapMark, escapeHtml(node.text ?? '')),
  hardBreak: () => '<br>',
  horizontalRule: () => '<hr>',
  paragraph: wrapped('p'),
  bulletList: wrapped('ul'),
  listItem: wrapped('li'),
  blockquote: wrapped('blockquote'),
  tableRow: wrapped('tr'),
  table: (node, parts) => `<table${idOf(node)}><tbody>${inner(node, parts)}</tbody></table>`,
  tableHeader: (node, parts) => `<th${spans(node)}>${inner(node, parts)}</th>`,
  tableCell: (node, parts) => `<td${spans(node)}>${inner(node, parts)}</td>`,
  heading(node, parts) {
    const tag = `h${Number(node.attrs?.level) + 1}`
    return `<${tag}${idOf(node)}>${inner(node, parts)}</${tag}>`
  },
  orderedList: (node, parts) =>
    `<ol${idOf(node)} start="${Number(node.attrs?.start)}">${inner(node, parts)}</ol>`,
  codeBlock: (node, parts) => `<pre${idOf(node)}><code>${inner(node, parts)}</code></pre>`,
  image: renderImage,
  mathInline: (node) =>
    `<span class="maths">${mathsHtml(String(node.attrs?.latex), false, escapeHtml)}</span>`,
  mathBlock: (node) =>
    `<div class="maths"${idOf(node)}>${mathsHtml(String(node.attrs?.latex), true, escapeHtml)}</div>`,
  calculation: (node, parts) =>
    `<section class="calculation"${idOf(node)}>${parts.calculation(String(node.attrs?.calculationId))}</section>`,
  quotedResult: (node, parts) =>
    `<span class="quoted-result"${idOf(node)}>${escapeHtml(parts.quote(String(node.attrs?.id)))}</span>`,
}

function inner(node: DocumentNode, parts: RenderParts): string {
  return (node.content ?? []).map((child) => renderers[child.type]!(child, parts)).join('')
}

function wrapped(tag: string): Render {
  return (node, parts) => `<${tag}${idOf(node)}>${inner(node, parts)}</${tag}>`
}

function idOf(node: DocumentNode): string {
  return typeof node.attrs?.id === 'string' ? ` id="${escapeHtml(node.attrs.id)}"` : ''
}

function spans(node: DocumentNode): string {
  const { colspan, rowspan } = node.attrs ?? {}
  const cells = (name: string, count: unknown) => (Number(count) > 1 ? ` ${name}="${Number(count)}"` : '')
  return idOf(node) + cells('colspan', colspan) + cells('rowspan', rowspan)
}

function renderImage(node: DocumentNode, parts: RenderParts): string {
  const { fileId, alt, caption, width } = node.attrs ?? {}
  const size = typeof width === 'number' ? ` width="${width}"` : ''
  const words = caption ? `<figcaption>${escapeHtml(String(caption))}</figcaption>` : ''
  const source = escapeHtml(parts.image(String(fileId)))
  return `<figure${idOf(node)}><img src="${source}" alt="${escapeHtml(String(alt ?? ''))}"${size}>${words}</figure>`
}

const markTags: Record<string, string> = {
  bold: 'strong',
  italic: 'em',
  underline: 'u',
  strike: 's',
  code: 'code',
  subscript: 'sub',
  superscript: 'sup',
}

function wrapMark(html: string, mark: DocumentMark): string {
  if (mark.type !== 'link') return `<${markTags[mark.type]}>${html}</${markTags[mark.type]}>`
  const href = String(mark.attrs?.href)
  return isAllowedHref(href) ? `<a href="${escapeHtml(href)}" rel="noopener noreferrer">${html}</a>` : html
}

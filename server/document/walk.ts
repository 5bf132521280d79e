import type { DocumentNode, NormalDocument } from './document.ts'

/** Every node of a document in document order. */
function* nodesOf(node: DocumentNode): Generator<DocumentNode> {
  yield node
  for (const child of node.content ?? []) yield* nodesOf(child)
}

export interface Quote {
  nodeId: string
  calculationId: string
  pointer: string
}

/** Ids of the calculations placed or quoted in a text, each once, in document order. */
export function calculationsIn(document: NormalDocument): string[] {
  return distinct(document, (node) =>
    node.type === 'calculation' || node.type === 'quotedResult' ? node.attrs?.calculationId : null,
  )
}

/** Quoted results in document order. */
export function quotesIn(document: NormalDocument): Quote[] {
  return [...nodesOf(document)]
    .filter((node) => node.type === 'quotedResult')
    .map(({ attrs }) => ({
      nodeId: String(attrs?.id),
      calculationId: String(attrs?.calculationId),
      pointer: String(attrs?.pointer),
    }))
}

/** Ids of the files shown as pictures, each once, in document order. */
export function filesIn(document: NormalDocument): string[] {
  return distinct(document, (node) => (node.type === 'image' ? node.attrs?.fileId : null))
}

function distinct(document: NormalDocument, pick: (node: DocumentNode) => unknown): string[] {
  const found = new Set<string>()
  for (const node of nodesOf(document)) {
    const id = pick(node)
    if (typeof id === 'string') found.add(id)
  }
  return [...found]
}

/**
 * The words of a text, a line a block: for search, comparison and previews. Formulae are given as LaTeX, quoted results
 * as `quote` says (nothing by default), pictures by their caption.
 */
export function plainText(document: NormalDocument, quote: (nodeId: string) => string = () => ''): string {
  return lines(document, quote)
    .filter((line) => line.trim() !== '')
    .join('\n')
}

function lines(node: DocumentNode, quote: (nodeId: string) => string): string[] {
  if (node.type === 'mathBlock') return [String(node.attrs?.latex)]
  if (node.type === 'image') return [String(node.attrs?.caption || node.attrs?.alt)]
  const content = node.content ?? []
  if (!content.some((child) => isInline(child))) return content.flatMap((child) => lines(child, quote))
  return content
    .map((child) => inlineText(child, quote))
    .join('')
    .split('\n')
}

const inlineTypes = new Set(['text', 'hardBreak', 'mathInline', 'quotedResult'])

function isInline(node: DocumentNode): boolean {
  return inlineTypes.has(node.type)
}

function inlineText(node: DocumentNode, quote: (nodeId: string) => string): string {
  if (node.type === 'text') return node.text ?? ''
  if (node.type === 'hardBreak') return '\n'
  if (node.type === 'mathInline') return String(node.attrs?.latex)
  return quote(String(node.attrs?.id))
}

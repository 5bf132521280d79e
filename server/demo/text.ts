/** Short ways to write the rich text of the demonstration. */
export type TextNode = Record<string, unknown>

export const doc = (...content: TextNode[]) => ({ type: 'doc' as const, content })
export const p = (...parts: (string | TextNode)[]): TextNode => ({ type: 'paragraph', content: inline(parts) })
export const h = (level: 1 | 2 | 3, text: string): TextNode => ({ type: 'heading', attrs: { level }, content: inline([text]) })
export const maths = (latex: string): TextNode => ({ type: 'mathBlock', attrs: { latex } })
export const m = (latex: string): TextNode => ({ type: 'mathInline', attrs: { latex } })
export const calculation = (calculationId: string): TextNode => ({ type: 'calculation', attrs: { calculationId } })
export const quote = (calculationId: string, pointer: string): TextNode => ({ type: 'quotedResult', attrs: { calculationId, pointer } })
export const bullets = (...items: string[]): TextNode => ({
  type: 'bulletList',
  content: items.map((item) => ({ type: 'listItem', content: [p(item)] })),
})

/** A table whose first row is its head. */
export function table(head: string[], ...rows: string[][]): TextNode {
  const row = (type: string) => (cells: string[]) => ({
    type: 'tableRow',
    content: cells.map((cell) => ({ type, content: [p(cell)] })),
  })
  return { type: 'table', content: [row('tableHeader')(head), ...rows.map(row('tableCell'))] }
}

function inline(parts: (string | TextNode)[]): TextNode[] {
  return parts.map((part) => (typeof part === 'string' ? { type: 'text', text: part } : part))
}

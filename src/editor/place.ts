import type { Editor } from '@tiptap/core'
import { Fragment, type Node } from '@tiptap/pm/model'
import { NodeSelection, Selection, TextSelection, type EditorState, type Transaction } from '@tiptap/pm/state'

/** Position after the block of the top level in which the selection ends. */
function afterCurrentBlock(state: EditorState): number {
  const { $to } = state.selection
  return $to.depth === 0 ? $to.pos : $to.after(1)
}

/** Puts blocks after the one with the cursor, or in place of it when it is an empty paragraph; a line to go on follows. */
export function insertBlocks(
  editor: Editor,
  nodes: { type: string; attrs: Record<string, unknown> }[],
): void {
  const { state, view } = editor
  const { $from } = state.selection
  const blocks = nodes.map((node) => state.schema.nodeFromJSON(node))
  const here = $from.depth === 1 && $from.parent.type.name === 'paragraph' && $from.parent.content.size === 0
  const from = here ? $from.before(1) : afterCurrentBlock(state)
  const to = here ? $from.after(1) : from
  const atEnd = to >= state.doc.content.size
  const content = atEnd ? [...blocks, state.schema.nodes.paragraph!.create()] : blocks
  const size = Fragment.from(content).size
  const transaction = state.tr.replaceWith(from, to, content)
  const next = Math.min(from + size - (atEnd ? 1 : 0), transaction.doc.content.size)
  view.dispatch(
    transaction.setSelection(TextSelection.near(transaction.doc.resolve(next), -1)).scrollIntoView(),
  )
}

/** Moves the block at a position over its neighbour; null when there is none on that side. */
export function moveBlock(state: EditorState, pos: number, by: -1 | 1): Transaction | null {
  const $pos = state.doc.resolve(pos)
  const node = $pos.nodeAfter
  const neighbour = siblingOf($pos.parent, $pos.index(), by)
  if (!node || !neighbour) return null
  const transaction = state.tr.delete(pos, pos + node.nodeSize)
  const target = by < 0 ? pos - neighbour.nodeSize : pos + neighbour.nodeSize
  transaction.insert(target, node)
  return transaction.setSelection(NodeSelection.create(transaction.doc, target)).scrollIntoView()
}

function siblingOf(parent: Node, index: number, by: -1 | 1): Node | null {
  return parent.maybeChild(index + by)
}

/**
 * Puts a successor in the place of a calculation: in its block and in every figure quoted from it. One edit, so that one
 * undo takes the curve and the figures back together.
 */
export function succeedCalculation(
  state: EditorState,
  calculationId: string,
  successorId: string,
): Transaction {
  const transaction = state.tr
  state.doc.descendants((node, pos) => {
    if (node.attrs.calculationId === calculationId)
      transaction.setNodeAttribute(pos, 'calculationId', successorId)
  })
  return transaction
}

/** A press under the last block goes on there: with the cursor in it when it is text, else in a new line. */
export function continueAtEnd(editor: Editor): void {
  goOnAfter(editor, editor.state.doc.content.size)
}

/** Puts the cursor after a position, into the text that follows or, where there is none, into a new line at the end. */
export function goOnAfter(editor: Editor, pos: number): void {
  const { state, view } = editor
  const transaction = state.tr
  const $pos = state.doc.resolve(pos)
  const atEnd = pos >= state.doc.content.size
  const follows = $pos.parent.inlineContent || (!atEnd && Selection.findFrom($pos, 1, true) !== null)
  if (!follows && !(atEnd && state.doc.lastChild?.isTextblock)) {
    transaction.insert(state.doc.content.size, state.schema.nodes.paragraph!.create())
  }
  const $place = transaction.doc.resolve(follows ? pos : transaction.doc.content.size)
  view.dispatch(transaction.setSelection(Selection.near($place, follows ? 1 : -1)).scrollIntoView())
  view.focus()
}

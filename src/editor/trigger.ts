import type { EditorState } from '@tiptap/pm/state'

export interface Trigger {
  kind: 'insert' | 'figure'
  /** From the sign that opened it to the cursor: what a choice replaces. */
  from: number
  to: number
  query: string
}

/**
 * What the words before the cursor ask for: `/` and letters for something to insert, `=` and letters for a figure to
 * quote; the sign stands at the beginning of a line or after a space.
 */
export function triggerAt(state: EditorState): Trigger | null {
  const { $from, empty } = state.selection
  if (!empty || !$from.parent.isTextblock || $from.parent.type.spec.code) return null
  const before = $from.parent.textBetween(
    Math.max(0, $from.parentOffset - 40),
    $from.parentOffset,
    undefined,
    '\ufffc',
  )
  const found = /(?:^|[\s\ufffc(])([/=])([^\s/=][^\s/=]*|)$/u.exec(before)
  if (!found) return null
  const [, sign, query = ''] = found
  return {
    kind: sign === '/' ? 'insert' : 'figure',
    from: $from.pos - query.length - 1,
    to: $from.pos,
    query,
  }
}

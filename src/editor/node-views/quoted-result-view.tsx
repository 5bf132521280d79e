import { NodeViewWrapper, type ReactNodeViewProps } from '@tiptap/react'
import { useEditorParts } from '../editor-parts.ts'

/** A figure in a sentence. */
export function QuotedResultView({ node }: ReactNodeViewProps) {
  const parts = useEditorParts()
  return (
    <NodeViewWrapper as="span" contentEditable={false}>
      {parts.quote(String(node.attrs.calculationId), String(node.attrs.pointer))}
    </NodeViewWrapper>
  )
}

import { NodeViewWrapper, type ReactNodeViewProps } from '@tiptap/react'
import { TextButton } from '../../ui/button.tsx'
import { useEditorParts } from '../editor-parts.ts'
import { moveBlock, succeedCalculation } from '../place.ts'

/** The place of a calculation block in the text, with the acts on that place. */
export function CalculationView({ node, editor, getPos, deleteNode }: ReactNodeViewProps) {
  const parts = useEditorParts()
  const id = String(node.attrs.calculationId)

  function move(by: -1 | 1) {
    const pos = getPos()
    const transaction = pos === undefined ? null : moveBlock(editor.state, pos, by)
    if (transaction) editor.view.dispatch(transaction)
  }

  const acts = editor.isEditable && (
    <>
      <TextButton onClick={() => move(-1)} aria-label="Move this block up">
        Up
      </TextButton>
      <TextButton onClick={() => move(1)} aria-label="Move this block down">
        Down
      </TextButton>
      <TextButton onClick={deleteNode} aria-label="Take this block out of the text">
        Remove
      </TextButton>
    </>
  )
  return (
    <NodeViewWrapper className="hs-block-place" contentEditable={false} data-node-id={node.attrs.id}>
      {parts.calculation(id, acts, (successorId) =>
        editor.view.dispatch(succeedCalculation(editor.state, id, successorId)),
      )}
    </NodeViewWrapper>
  )
}

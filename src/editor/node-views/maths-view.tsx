import { NodeViewWrapper, type ReactNodeViewProps } from '@tiptap/react'
import { useEffect, useRef, useState, type KeyboardEvent } from 'react'
import { goOnAfter } from '../place.ts'
import { Maths } from './maths.tsx'

export const MathInlineView = (props: ReactNodeViewProps) => <MathsView {...props} display={false} />
export const MathBlockView = (props: ReactNodeViewProps) => <MathsView {...props} display />

/** A formula; pressing it, or reaching it with the keys and pressing Enter, opens its LaTeX under it. */
function MathsView({
  node,
  editor,
  selected,
  display,
  getPos,
  updateAttributes,
  deleteNode,
}: ReactNodeViewProps & { display: boolean }) {
  const latex = String(node.attrs.latex)
  const [editing, setEditing] = useState(latex === '' && editor.isEditable)

  useEffect(() => {
    if (!selected || !editor.isEditable) return
    function onKeyDown(event: globalThis.KeyboardEvent) {
      if (event.key !== 'Enter') return
      event.preventDefault()
      event.stopPropagation()
      setEditing(true)
    }
    const element = editor.view.dom
    element.addEventListener('keydown', onKeyDown, { capture: true })
    return () => element.removeEventListener('keydown', onKeyDown, { capture: true })
  }, [selected, editor])

  function close(text: string) {
    setEditing(false)
    if (text.trim() === '') return deleteNode()
    if (text !== latex) updateAttributes({ latex: text })
    const pos = getPos()
    if (pos !== undefined) goOnAfter(editor, pos + node.nodeSize)
  }

  const Tag = display ? 'div' : 'span'
  return (
    <NodeViewWrapper
      as={Tag}
      className={display ? 'hs-maths-block' : 'hs-maths-inline'}
      contentEditable={false}
    >
      <span onClick={() => editor.isEditable && setEditing(true)} data-selected={selected ? '' : undefined}>
        {latex !== '' && !editing && <Maths latex={latex} display={display} />}
      </span>
      {editing && <LatexField latex={latex} display={display} onClose={close} />}
    </NodeViewWrapper>
  )
}

function LatexField({
  latex,
  display,
  onClose,
}: {
  latex: string
  display: boolean
  onClose: (latex: string) => void
}) {
  const [text, setText] = useState(latex)
  const field = useRef<HTMLTextAreaElement>(null)
  useEffect(() => {
    field.current?.focus()
  }, [])

  function onKeyDown(event: KeyboardEvent) {
    if (event.key === 'Enter' && !event.shiftKey) {
      event.preventDefault()
      onClose(text)
    }
    if (event.key === 'Escape') {
      event.stopPropagation()
      onClose(latex)
    }
  }

  return (
    <span className="hs-latex">
      {text !== '' && <Maths latex={text} display={display} />}
      <textarea
        ref={field}
        className="hs-input"
        rows={1}
        aria-label="Formula in LaTeX. Enter keeps it, Escape restores it."
        placeholder="g^{(2)}(0) < \tfrac12"
        spellCheck={false}
        value={text}
        onChange={(event) => setText(event.target.value)}
        onKeyDown={onKeyDown}
        onBlur={() => onClose(text)}
      />
    </span>
  )
}

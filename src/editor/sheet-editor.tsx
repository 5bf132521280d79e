import { EditorContent, useEditor, type Editor } from '@tiptap/react'
import { useEffect, useRef } from 'react'
import type { NormalDocument } from '../../server/document/document.ts'
import { useEditorParts } from './editor-parts.ts'
import { continueAtEnd } from './place.ts'
import { sheetExtensions } from './sheet-extensions.ts'
import { TriggerMenu } from './trigger-menu.tsx'
import './editor.css'

interface SheetEditorProps {
  initial: NormalDocument
  editable: boolean
  label: string
  /** Told of every change of the text, not of opening it. */
  onChange: () => void
  /** The editor, for a toolbar and for what the page inserts. */
  onReady: (editor: Editor) => void
}

/** The text of a sheet, written in place. */
export function SheetEditor({ initial, editable, label, onChange, onReady }: SheetEditorProps) {
  const parts = useEditorParts()
  const latest = useRef({ parts, onChange })
  useEffect(() => {
    latest.current = { parts, onChange }
  })
  const editor = useEditor(
    {
      extensions: sheetExtensions,
      content: initial,
      editable,
      injectCSS: false,
      shouldRerenderOnTransaction: false,
      editorProps: {
        attributes: {
          class: 'hs-prose hs-editor',
          role: 'textbox',
          'aria-multiline': 'true',
          'aria-label': label,
        },
        handleClick: (view, _pos, event) => {
          const link = (event.target as HTMLElement).closest('a')
          const href = link?.getAttribute('href')
          if (!href || (view.editable && !event.ctrlKey && !event.metaKey)) return false
          event.preventDefault()
          latest.current.parts.openLink(href)
          return true
        },
      },
      onUpdate: ({ transaction }) => {
        if (transaction.docChanged) latest.current.onChange()
      },
    },
    [],
  )

  useEffect(() => onReady(editor), [editor, onReady])
  useEffect(() => editor.setEditable(editable, false), [editor, editable])

  return (
    <>
      <EditorContent editor={editor} />
      {editable && (
        <button
          type="button"
          className="hs-editor-end"
          onClick={() => continueAtEnd(editor)}
          tabIndex={-1}
          aria-hidden
        />
      )}
      {editable && <TriggerMenu editor={editor} />}
    </>
  )
}

import { useEditorState, type Editor } from '@tiptap/react'
import { useState, type KeyboardEvent, type ReactNode } from 'react'
import { useEditorParts } from './editor-parts.ts'
import { LinkDialog } from './link-dialog.tsx'
import { TableTools } from './table-tools.tsx'
import { Gap, Tool } from './tool.tsx'

/** Tools above the text. Each has its key; Tab goes past them, arrows go along them. */
export function Toolbar({ editor, end }: { editor: Editor; end?: ReactNode }) {
  const parts = useEditorParts()
  const [linking, setLinking] = useState(false)
  const now = useEditorState({ editor, selector: ({ editor: at }) => activeIn(at) })
  const run = () => editor.chain().focus()
  return (
    <div className="hs-toolbar" role="toolbar" aria-label="Text" onKeyDown={alongTools}>
      <Tool
        label="Bold"
        keys="Ctrl B"
        on={now.bold}
        run={() => run().toggleBold().run()}
        text={<b>B</b>}
        first
      />
      <Tool
        label="Italic"
        keys="Ctrl I"
        on={now.italic}
        run={() => run().toggleItalic().run()}
        text={<i>I</i>}
      />
      <Tool
        label="Underlined"
        keys="Ctrl U"
        on={now.underline}
        run={() => run().toggleUnderline().run()}
        text={<u>U</u>}
      />
      <Tool
        label="Struck out"
        keys="Ctrl Shift S"
        on={now.strike}
        run={() => run().toggleStrike().run()}
        text={<s>S</s>}
      />
      <Tool
        label="Lowered"
        keys="Ctrl ,"
        on={now.subscript}
        run={() => run().toggleMark('subscript').run()}
        text={
          <span>
            x<sub>2</sub>
          </span>
        }
      />
      <Tool
        label="Raised"
        keys="Ctrl ."
        on={now.superscript}
        run={() => run().toggleMark('superscript').run()}
        text={
          <span>
            x<sup>2</sup>
          </span>
        }
      />
      <Tool label="Link" on={now.link} run={() => setLinking(true)} icon="link" />
      <Gap />
      <Tool
        label="Section head"
        keys="##"
        on={now.head}
        run={() => run().toggleHeading({ level: 2 }).run()}
        text="H"
      />
      <Tool label="List" keys="-" on={now.bullets} run={() => run().toggleBulletList().run()} text="•" />
      <Tool
        label="Numbered list"
        keys="1."
        on={now.numbers}
        run={() => run().toggleOrderedList().run()}
        text="1."
      />
      <Tool
        label="Table"
        run={() => run().insertTable({ rows: 3, cols: 3, withHeaderRow: true }).run()}
        icon="table"
        on={now.table}
      />
      <Tool
        label="Formula"
        keys="$x$"
        run={() =>
          run()
            .insertContent({ type: 'mathInline', attrs: { latex: '' } })
            .run()
        }
        text={<i className="hs-var">ƒ</i>}
      />
      <Tool label="Picture" run={() => parts.askForPicture()} icon="image" />
      <Gap />
      <Tool
        label="Calculation"
        keys="/"
        run={() => parts.askForCalculation()}
        icon="trace"
        words="Calculation"
      />
      <Tool
        label="Quoted result"
        keys="="
        run={() => {
          const before = editor.state.selection.$from.nodeBefore
          const glued = before?.isText && !/\s$/.test(before.text ?? '')
          run()
            .insertContent(glued ? ' =' : '=')
            .run()
        }}
        text="="
        words="Result"
      />
      <span className="hs-toolbar-end">
        {end}
        <Tool label="Undo" keys="Ctrl Z" off={!now.undo} run={() => run().undo().run()} words="Undo" />
        <Tool label="Redo" keys="Ctrl Shift Z" off={!now.redo} run={() => run().redo().run()} words="Redo" />
      </span>
      {now.table && <TableTools editor={editor} />}
      {linking && <LinkDialog editor={editor} onClose={() => setLinking(false)} />}
    </div>
  )
}

function activeIn(editor: Editor) {
  return {
    bold: editor.isActive('bold'),
    italic: editor.isActive('italic'),
    underline: editor.isActive('underline'),
    strike: editor.isActive('strike'),
    subscript: editor.isActive('subscript'),
    superscript: editor.isActive('superscript'),
    link: editor.isActive('link'),
    head: editor.isActive('heading'),
    bullets: editor.isActive('bulletList'),
    numbers: editor.isActive('orderedList'),
    table: editor.isActive('table'),
    undo: editor.can().undo(),
    redo: editor.can().redo(),
  }
}

function alongTools(event: KeyboardEvent<HTMLDivElement>) {
  const by = event.key === 'ArrowRight' ? 1 : event.key === 'ArrowLeft' ? -1 : 0
  if (by === 0) return
  const tools = [...event.currentTarget.querySelectorAll<HTMLButtonElement>('.hs-tool')]
  const at = tools.indexOf(document.activeElement as HTMLButtonElement)
  tools[(at + by + tools.length) % tools.length]?.focus()
  event.preventDefault()
}

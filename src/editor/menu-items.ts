import type { Editor } from '@tiptap/core'
import type { EditorParts } from './editor-parts.ts'

export interface MenuItem {
  key: string
  label: string
  note?: string
  /** Further words that find it. */
  also?: string
  run(editor: Editor): void
}

/** Everything that can be put into the text, in the order in which it is used. */
export function insertItems(parts: EditorParts): MenuItem[] {
  return [
    {
      key: 'calculation',
      label: 'Calculation',
      note: 'computed from a file of this sheet',
      run: () => parts.askForCalculation(),
    },
    {
      key: 'quote',
      label: 'Quoted result',
      note: 'a figure that follows its calculation; key =',
      also: 'figure value number',
      run: (editor) => editor.chain().focus().insertContent('=').run(),
    },
    {
      key: 'formula',
      label: 'Formula in the line',
      note: '$x$ does the same',
      also: 'maths latex equation',
      run: (editor) =>
        editor
          .chain()
          .focus()
          .insertContent({ type: 'mathInline', attrs: { latex: '' } })
          .run(),
    },
    {
      key: 'display',
      label: 'Displayed formula',
      also: 'maths latex equation block',
      run: (editor) =>
        editor
          .chain()
          .focus()
          .insertContent({ type: 'mathBlock', attrs: { latex: '' } })
          .run(),
    },
    head(1, 'Head'),
    head(2, 'Section head'),
    head(3, 'Small head'),
    {
      key: 'bullets',
      label: 'List',
      also: 'bullet points',
      run: (editor) => editor.chain().focus().toggleBulletList().run(),
    },
    {
      key: 'numbers',
      label: 'Numbered list',
      run: (editor) => editor.chain().focus().toggleOrderedList().run(),
    },
    {
      key: 'table',
      label: 'Table',
      run: (editor) => editor.chain().focus().insertTable({ rows: 3, cols: 3, withHeaderRow: true }).run(),
    },
    { key: 'picture', label: 'Picture', also: 'image photo', run: () => parts.askForPicture() },
    {
      key: 'citation',
      label: 'Citation',
      also: 'quote block',
      run: (editor) => editor.chain().focus().toggleBlockquote().run(),
    },
    {
      key: 'code',
      label: 'Program text',
      also: 'code script',
      run: (editor) => editor.chain().focus().toggleCodeBlock().run(),
    },
    {
      key: 'rule',
      label: 'Rule',
      also: 'line divider',
      run: (editor) => editor.chain().focus().setHorizontalRule().run(),
    },
  ]
}

function head(level: 1 | 2 | 3, label: string): MenuItem {
  return {
    key: `head-${level}`,
    label,
    also: `heading title h${level}`,
    run: (editor) => editor.chain().focus().toggleHeading({ level }).run(),
  }
}

/** Figures of the sheet's calculations, to be quoted. */
export function figureItems(parts: EditorParts): MenuItem[] {
  return parts.figures.map(({ calculationId, pointer, calculation, name, text }) => ({
    key: calculationId + pointer,
    label: `${calculation}  ${name} = ${text}`,
    also: calculation,
    run: (editor) => {
      editor.chain().focus().insertContent({ type: 'quotedResult', attrs: { calculationId, pointer } }).run()
    },
  }))
}

/** Items whose words begin with what was typed, the label before further words. */
export function matching(items: MenuItem[], query: string): MenuItem[] {
  const wanted = query.toLowerCase()
  const words = (text: string) => text.toLowerCase().split(/\s+/)
  const byLabel = items.filter(({ label }) => words(label).some((word) => word.startsWith(wanted)))
  const byOther = items.filter(
    (item) =>
      !byLabel.includes(item) &&
      words(`${item.also ?? ''} ${item.note ?? ''}`).some((word) => word.startsWith(wanted)),
  )
  return [...byLabel, ...byOther]
}

import type { Editor } from '@tiptap/react'
import type { Entry } from '../../../server/contract/entries.ts'
import type { NormalDocument } from '../../../server/document/index.ts'
import { EditorPartsProvider } from '../../editor/editor-parts.ts'
import { SheetEditor } from '../../editor/sheet-editor.tsx'
import { OutsideLink } from './outside-link.tsx'
import { useSheetParts } from './use-sheet-parts.tsx'

interface SheetTextProps {
  entry: Entry
  content: NormalDocument
  /** The editor, for what a page does with the text, such as marking a passage. */
  onReady?: (editor: Editor) => void
}

const nothing = () => {}

/** The text of a sheet to be read: the same setting as where it is written. */
export function SheetText({ entry, content, onReady = nothing }: SheetTextProps) {
  const { parts, leaving, stay } = useSheetParts(entry, false)
  return (
    <EditorPartsProvider value={parts}>
      <SheetEditor
        initial={content}
        editable={false}
        label={`Text of ${entry.number}`}
        onChange={nothing}
        onReady={onReady}
      />
      <OutsideLink href={leaving} onClose={stay} />
    </EditorPartsProvider>
  )
}

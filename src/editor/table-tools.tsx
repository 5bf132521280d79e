import type { Editor } from '@tiptap/react'
import { TextButton } from '../ui/button.tsx'

/** What can be done with the table around the cursor. */
export function TableTools({ editor }: { editor: Editor }) {
  const run = () => editor.chain().focus()
  const acts: [string, () => boolean][] = [
    ['Row below', () => run().addRowAfter().run()],
    ['Column right', () => run().addColumnAfter().run()],
    ['Head row', () => run().toggleHeaderRow().run()],
    ['Remove row', () => run().deleteRow().run()],
    ['Remove column', () => run().deleteColumn().run()],
    ['Remove table', () => run().deleteTable().run()],
  ]
  return (
    <span className="hs-table-tools" role="group" aria-label="Table">
      {acts.map(([words, act]) => (
        <TextButton key={words} onMouseDown={(event) => event.preventDefault()} onClick={act}>
          {words}
        </TextButton>
      ))}
    </span>
  )
}

import { useState } from 'react'
import type { Entry } from '../../../../server/contract/entries.ts'
import type { EntrySignature } from '../../../../server/contract/signatures.ts'
import { Button } from '../../../ui/button.tsx'
import { stampWords } from '../meaning-words.ts'
import { SignatureDialog } from './signature-dialog.tsx'

export interface SheetOnScreen {
  entry: Entry
  me: { id: string; name: string }
  laboratoryId: string
  /** The text as it stands on the screen. */
  shownContent: () => unknown
  /** Saves what is not saved yet. */
  save?: () => Promise<void>
}

/** The author's act. With one author left it submits the sheet to the witness, else the others sign after this. */
export function SignAct({ sheet, onSigned }: { sheet: SheetOnScreen; onSigned?: (signature: EntrySignature) => void }) {
  const [open, setOpen] = useState(false)
  const { entry, me } = sheet
  const others = entry.authors.filter((author) => !author.signed && author.personId !== me.id)
  const last = others.length === 0
  const verb = last ? 'Sign and submit' : 'Sign'
  return (
    <>
      <Button kind="primary" icon="pen" onClick={() => setOpen(true)}>
        {verb}
      </Button>
      {open && (
        <SignatureDialog
          onClose={() => setOpen(false)}
          subject={{ ...sheet, entryId: entry.id, meaning: 'authorship' }}
          number={entry.number}
          title={entry.title}
          verb={verb}
          harmless="Keep writing"
          inFull
          onSigned={(signature) => onSigned?.(signature)}
          done={(signature) => (
            <>
              <b>{last ? 'Signed and submitted.' : 'Signed.'}</b>{' '}
              {last
                ? 'The sheet waits for a witness; its text can change only after a return or a recall.'
                : `${others.map((author) => author.name).join(' and ')} must sign too before it goes to the witness.`}{' '}
              It is {stampWords(signature.timeStamp)}.
            </>
          )}
        />
      )}
    </>
  )
}

import { useState } from 'react'
import type { Entry } from '../../../../server/contract/entries.ts'
import type { EntrySignature } from '../../../../server/contract/signatures.ts'
import { Button } from '../../../ui/button.tsx'
import { stampSentence } from '../meaning-words.ts'
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

/**
 * The author's act, where it is open to the person. With one author left it submits the sheet to the witness, else the
 * others sign after this. To be kept on the page: its result outlives the right to sign.
 */
export function SignAct({
  sheet,
  onSigned,
}: {
  sheet: SheetOnScreen
  onSigned?: (signature: EntrySignature) => void
}) {
  // The entry as it was when the dialog opened; the act itself changes what the page has.
  const [begun, setBegun] = useState<Entry | null>(null)
  const { entry, me } = sheet
  const { verb, others } = authorshipOf(begun ?? entry, me.id)
  return (
    <>
      {entry.allowed.includes('sign:authorship') && (
        <Button kind="primary" icon="pen" onClick={() => setBegun(entry)}>
          {verb}
        </Button>
      )}
      {begun && (
        <SignatureDialog
          onClose={() => setBegun(null)}
          subject={{ ...sheet, entryId: entry.id, meaning: 'authorship' }}
          number={entry.number}
          title={entry.title}
          verb={verb}
          harmless="Keep writing"
          inFull
          onSigned={(signature) => onSigned?.(signature)}
          done={(signature) => <Signed signature={signature} others={others} />}
        />
      )}
    </>
  )
}

/** Who must sign after me, and what the act is called accordingly. */
function authorshipOf(entry: Entry, myId: string) {
  const others = entry.authors
    .filter((author) => !author.signed && author.personId !== myId)
    .map((author) => author.name)
  return { others, verb: others.length === 0 ? 'Sign and submit' : 'Sign' }
}

function Signed({ signature, others }: { signature: EntrySignature; others: string[] }) {
  return (
    <>
      <b>{others.length === 0 ? 'Signed and submitted.' : 'Signed.'}</b>{' '}
      {others.length === 0
        ? 'The sheet waits for a witness; its text can change only after a return or a recall.'
        : `${others.join(' and ')} must sign too before it goes to the witness.`}{' '}
      {stampSentence(signature.timeStamp)}
    </>
  )
}

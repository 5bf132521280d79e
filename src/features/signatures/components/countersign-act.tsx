import { useState } from 'react'
import type { EntrySignature, Meaning } from '../../../../server/contract/signatures.ts'
import { Button } from '../../../ui/button.tsx'
import { stampWords } from '../meaning-words.ts'
import type { Presence } from '../signing.ts'
import { MeaningChoice } from './meaning-choice.tsx'
import type { SheetOnScreen } from './sign-act.tsx'
import { SignatureDialog } from './signature-dialog.tsx'

/** The witness's act: first what the signature is to mean, then the statement and the passphrase. */
export function CountersignAct({
  sheet,
  zone,
  disabledReason,
  onSigned,
}: {
  sheet: SheetOnScreen
  zone: string
  disabledReason: string | null
  onSigned: (signature: EntrySignature) => void
}) {
  const [open, setOpen] = useState(false)
  const [meaning, setMeaning] = useState<Extract<Meaning, `witness-${string}`>>('witness-read')
  const [presence, setPresence] = useState<Presence | null>(null)
  const { entry } = sheet
  const seals = entry.witnesses.given + 1 >= entry.witnesses.required
  return (
    <>
      <Button kind="primary" disabledReason={disabledReason} onClick={() => setOpen(true)}>
        Countersign
      </Button>
      {open && (
        <SignatureDialog
          key={meaning}
          onClose={() => setOpen(false)}
          subject={{ ...sheet, entryId: entry.id, meaning, presence: meaning === 'witness-present' ? (presence ?? undefined) : undefined }}
          number={entry.number}
          title={entry.title}
          verb="Countersign"
          harmless="Keep reading"
          before={
            <MeaningChoice entry={entry} zone={zone} meaning={meaning} onMeaning={setMeaning} presence={presence} onPresence={setPresence} />
          }
          chosen={meaning === 'witness-read' || presence !== null}
          onSigned={onSigned}
          done={(signature) => (
            <>
              <b>Countersigned.</b>{' '}
              {seals
                ? 'The sheet is sealed in the ledger; nothing in it can change afterwards.'
                : `${entry.witnesses.required - entry.witnesses.given - 1} more must countersign before it is sealed.`}{' '}
              It is {stampWords(signature.timeStamp)}.
            </>
          )}
        />
      )}
    </>
  )
}

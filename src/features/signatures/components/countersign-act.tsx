import { useState } from 'react'
import type { Entry } from '../../../../server/contract/entries.ts'
import type { EntrySignature } from '../../../../server/contract/signatures.ts'
import { Button } from '../../../ui/button.tsx'
import { stampSentence } from '../meaning-words.ts'
import type { Presence } from '../signing.ts'
import { MeaningChoice, type WitnessMeaning } from './meaning-choice.tsx'
import type { SheetOnScreen } from './sign-act.tsx'
import { SignatureDialog } from './signature-dialog.tsx'

/**
 * The witness's act, where it is open to the person: what the signature is to mean, then the statement and the passphrase.
 * To be kept on the page: its result outlives the right to sign.
 */
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
  // The entry as it was when the dialog opened; the act itself changes what the page has.
  const [begun, setBegun] = useState<Entry | null>(null)
  const [meaning, setMeaning] = useState<WitnessMeaning>('witness-read')
  const [presence, setPresence] = useState<Presence | null>(null)
  const { entry } = sheet
  const present = meaning === 'witness-present'
  return (
    <>
      {entry.allowed.includes('witness:read') && (
        <Button kind="primary" disabledReason={disabledReason} onClick={() => setBegun(entry)}>
          Countersign
        </Button>
      )}
      {begun && (
        <SignatureDialog
          key={meaning}
          onClose={() => setBegun(null)}
          subject={{
            ...sheet,
            entryId: entry.id,
            meaning,
            presence: present ? (presence ?? undefined) : undefined,
          }}
          number={entry.number}
          title={entry.title}
          verb="Countersign"
          harmless="Keep reading"
          before={
            <MeaningChoice
              entry={begun}
              zone={zone}
              meaning={meaning}
              onMeaning={setMeaning}
              presence={presence}
              onPresence={setPresence}
            />
          }
          chosen={!present || presence !== null}
          onSigned={onSigned}
          done={(signature) => (
            <Countersigned
              signature={signature}
              more={begun.witnesses.required - begun.witnesses.given - 1}
            />
          )}
        />
      )}
    </>
  )
}

function Countersigned({ signature, more }: { signature: EntrySignature; more: number }) {
  return (
    <>
      <b>Countersigned.</b>{' '}
      {more <= 0
        ? 'The sheet is sealed in the ledger; nothing in it can change afterwards.'
        : `${more} more must countersign before it is sealed.`}{' '}
      {stampSentence(signature.timeStamp)}
    </>
  )
}

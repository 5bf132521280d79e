import { useQuery } from '@tanstack/react-query'
import { useState, type FormEvent } from 'react'
import type { Person } from '../../../../server/contract/people.ts'
import { sentenceOf } from '../../../lib/api-problem.ts'
import { dateAndTime } from '../../../lib/times.ts'
import { Button } from '../../../ui/button.tsx'
import { Checkbox } from '../../../ui/checkbox.tsx'
import { Dialog, DialogPart } from '../../../ui/dialog.tsx'
import { PassphraseField, TextArea } from '../../../ui/field.tsx'
import { FringeMark } from '../../../ui/fringe-mark.tsx'
import { Message } from '../../../ui/message.tsx'
import { Progress } from '../../../ui/progress.tsx'
import { endorsementStatement } from '../../../../server/ledger-format/statements.ts'
import { checkedEnrolment, type CheckedEnrolment } from '../enrolment.ts'
import { useEndorseKey, type Owner } from '../mutations.ts'
import { enrolmentQuery } from '../queries.ts'
import { signingTrouble } from '../signing-problems.ts'
import { useShare } from '../use-share.ts'

interface EndorseProps {
  person: Pick<Person, 'id' | 'name'>
  me: Owner
  laboratory: { id: string; name: string }
}

/**
 * A manager or supervisor endorses the newest key of another person, after checking who that person is. It is offered where
 * such a key waits, also beside one that still signs; and kept while its dialog is open, since the act ends the waiting.
 */
export function EndorseAct(props: EndorseProps) {
  const [open, setOpen] = useState(false)
  const { data: newest } = useQuery({ ...enrolmentQuery(props.person.id), retry: false })
  return (
    <>
      {newest?.status === 'awaiting-endorsement' && (
        <Button size="small" onClick={() => setOpen(true)}>
          Endorse key
        </Button>
      )}
      {open && <EndorseDialog {...props} onClose={() => setOpen(false)} />}
    </>
  )
}

function EndorseDialog({ person, me, laboratory, onClose }: EndorseProps & { onClose: () => void }) {
  const sent = useQuery({
    ...enrolmentQuery(person.id),
    select: checkedEnrolment,
  })
  return (
    <Dialog
      open
      onClose={onClose}
      title={`Endorse the key of ${person.name}`}
      about="Do this with the person before you. Your signature says who the person is, so that nobody else can sign under this name."
    >
      {sent.error && (
        <DialogPart>
          <Message kind="fault" title="The enrolment cannot be endorsed.">
            {sentenceOf(sent.error)}
          </Message>
        </DialogPart>
      )}
      {sent.data ? (
        <EndorseForm enrolled={sent.data} me={me} laboratory={laboratory} onClose={onClose} />
      ) : (
        <div className="hs-actions">
          <Button onClick={onClose}>Close</Button>
        </div>
      )}
    </Dialog>
  )
}

function EndorseForm({
  enrolled,
  me,
  laboratory,
  onClose,
}: {
  enrolled: CheckedEnrolment
  me: Owner
  laboratory: { id: string; name: string }
  onClose: () => void
}) {
  const [identity, setIdentity] = useState('')
  const [compared, setCompared] = useState(false)
  const [passphrase, setPassphrase] = useState('')
  const [share, setShare] = useShare()
  const endorse = useEndorseKey(me, laboratory)
  const { enrolment, digits, enrolmentSha256 } = enrolled
  const trouble = endorse.error ? signingTrouble(endorse.error) : null
  const reason = missing(identity, compared, passphrase)

  function submit(event: FormEvent) {
    event.preventDefault()
    if (reason !== null || endorse.isPending) return
    setShare(0)
    endorse.mutate(
      { passphrase, person: enrolled, identity: identity.trim(), onProgress: setShare },
      { onSettled: () => setShare(null), onSuccess: () => setPassphrase('') },
    )
  }

  if (endorse.isSuccess)
    return (
      <DialogPart>
        <Message kind="good" title="Endorsed.">
          {enrolment.name} can sign from now on.
        </Message>
        <div className="hs-actions mt-4">
          <Button kind="primary" onClick={onClose}>
            Close
          </Button>
        </div>
      </DialogPart>
    )
  return (
    <form onSubmit={submit}>
      <DialogPart>
        <div className="flex flex-wrap items-start gap-4">
          <FringeMark sha256={enrolmentSha256} size={52} />
          <div className="min-w-0 flex-1 basis-60">
            <p className="hs-quiet">Digits of the key, enrolled {dateAndTime(enrolment.time)}</p>
            <p className="hs-fig text-6">{digits}</p>
            <p className="hs-hint">
              Checked here: the key has signed its own enrolment, and these are its digits.
            </p>
          </div>
        </div>
        <div className="mt-3">
          <Checkbox
            label={`${enrolment.name} read the same digits from the page of the signing key.`}
            checked={compared}
            onChange={setCompared}
          />
        </div>
      </DialogPart>
      <DialogPart>
        <TextArea
          label="How you checked who this is"
          hint="For example: knows me from the group since 2021 and showed the staff card. No numbers of documents."
          value={identity}
          maxLength={500}
          onChange={(event) => setIdentity(event.target.value)}
        />
      </DialogPart>
      <DialogPart>
        <p className="hs-prose mb-3">
          “
          {endorsementStatement({
            endorser: me.name,
            person: enrolment.name,
            laboratory: laboratory.name,
            keyDigits: enrolmentSha256.slice(0, 16),
          })}
          ”
        </p>
        <PassphraseField
          label={`Signing passphrase of ${me.name}`}
          hint="It opens your key on this device and is not sent."
          value={passphrase}
          readOnly={endorse.isPending}
          error={trouble?.at === 'passphrase' ? trouble.words : null}
          onChange={(event) => setPassphrase(event.target.value)}
        />
        {share !== null && (
          <div className="mt-3">
            <Progress label="Opening the key" share={share} words="The key is opened." />
          </div>
        )}
        {trouble?.at === 'dialog' && (
          <div className="mt-3">
            <Message kind="fault" code={trouble.code}>
              {trouble.words}
            </Message>
          </div>
        )}
      </DialogPart>
      <div className="hs-actions mt-4.5">
        <Button kind="primary" type="submit" busy={endorse.isPending} disabledReason={reason}>
          Endorse key
        </Button>
        <Button onClick={onClose}>Not now</Button>
      </div>
    </form>
  )
}

function missing(identity: string, compared: boolean, passphrase: string): string | null {
  if (!compared) return 'Compare the digits first.'
  if (identity.trim() === '') return 'Say how you checked who this is.'
  return passphrase === '' ? 'Type your passphrase.' : null
}

import { useRef, useState, type FormEvent, type ReactNode } from 'react'
import type { EntrySignature } from '../../../../server/contract/signatures.ts'
import type { SignedRecord } from '../../../../server/ledger-format/record.ts'
import { sentenceOf } from '../../../lib/api-problem.ts'
import { Button, ButtonLink } from '../../../ui/button.tsx'
import { Dialog, DialogPart } from '../../../ui/dialog.tsx'
import { PassphraseField } from '../../../ui/field.tsx'
import { Message } from '../../../ui/message.tsx'
import { Progress } from '../../../ui/progress.tsx'
import { signingTrouble } from '../signing-problems.ts'
import { useSigning, type Preparation, type SigningSubject } from '../use-signing.ts'
import { useShare } from '../use-share.ts'
import { BlocksList } from './blocks-list.tsx'
import { SignedDigest, WhatIsSigned } from './what-is-signed.tsx'

interface SignatureDialogProps {
  onClose: () => void
  subject: SigningSubject
  number: string
  title: string
  /** The same verb in button, dialog and result. */
  verb: string
  harmless: string
  /** What the result says: "Signed and submitted". */
  done: (signature: EntrySignature) => ReactNode
  onSigned: (signature: EntrySignature) => void
  /** Chosen before the bytes are prepared: a witness's meaning and times. */
  before?: ReactNode
  /** False while that choice is not complete. */
  chosen?: boolean
  /** Shows all that is signed at once; else behind a summary. */
  inFull?: boolean
}

/** To be mounted when it opens, so that each opening begins anew. Prepares, shows what is signed, asks for the passphrase, signs, and says what became of it. Nothing times out here. */
export function SignatureDialog(props: SignatureDialogProps) {
  const { onClose, subject, number, title, verb, harmless, before, chosen = true, inFull = false } = props
  const [signed, setSigned] = useState<EntrySignature | null>(null)
  const [passphrase, setPassphrase] = useState('')
  const [share, setShare] = useShare()
  const form = useRef<HTMLFormElement>(null)
  const { preparation, signing } = useSigning(subject, chosen && signed === null, (signature) => {
    setSigned(signature)
    props.onSigned(signature)
  })
  const ready = preparation.data?.state === 'ready' ? preparation.data : null
  const trouble = signing.error ? signingTrouble(signing.error) : null

  function submit(event: FormEvent) {
    event.preventDefault()
    if (signing.isPending || passphrase === '') return
    setShare(0)
    signing.mutate(
      { passphrase, onProgress: setShare },
      { onSettled: () => setShare(null), onSuccess: () => setPassphrase('') },
    )
  }

  if (signed)
    return (
      <Dialog
        open
        onClose={onClose}
        title={number}
        about={title}
        actions={
          <Button kind="primary" onClick={onClose}>
            Close
          </Button>
        }
      >
        <DialogPart>
          <Message kind="good">{props.done(signed)}</Message>
        </DialogPart>
      </Dialog>
    )
  return (
    <Dialog
      open
      onClose={onClose}
      locked={signing.isPending}
      wide={inFull}
      title={`${verb} ${number}`}
      about={title}
      actions={
        <>
          {ready && (
            <Button
              kind="primary"
              busy={signing.isPending}
              disabledReason={passphrase === '' && !signing.isPending ? 'Type your passphrase first.' : null}
              onClick={() => form.current?.requestSubmit()}
            >
              {verb}
            </Button>
          )}
          <Button onClick={onClose}>{harmless}</Button>
        </>
      }
    >
      {before && <DialogPart>{before}</DialogPart>}
      {chosen && (
        <Prepared preparation={preparation} onGo={onClose}>
          {ready && (
            <>
              <DialogPart>
                <SignedDigest record={ready.record} />
              </DialogPart>
              <DialogPart>
                {inFull ? <WhatIsSigned record={ready.record} /> : <Folded record={ready.record} />}
              </DialogPart>
              <DialogPart>
                <p className="hs-prose">“{ready.record.signing.statement}”</p>
                <form ref={form} className="mt-4" onSubmit={submit}>
                  <PassphraseField
                    label={`Signing passphrase of ${subject.me.name}`}
                    hint="It opens your key on this device and is not sent. It is asked for with every signature."
                    value={passphrase}
                    readOnly={signing.isPending}
                    error={trouble?.at === 'passphrase' ? trouble.words : null}
                    onChange={(event) => setPassphrase(event.target.value)}
                  />
                </form>
                {share !== null && (
                  <div className="mt-3" role="status">
                    <Progress
                      label="Opening the key"
                      share={share}
                      words="The key is opened, which takes a few seconds by design."
                    />
                  </div>
                )}
              </DialogPart>
            </>
          )}
        </Prepared>
      )}
      {trouble?.at === 'dialog' && (
        <div className="mt-3">
          <Message
            kind="fault"
            code={trouble.code}
            actions={
              <Button size="small" onClick={() => void preparation.refetch().then(() => signing.reset())}>
                Read it again
              </Button>
            }
          >
            {trouble.words}
          </Message>
        </div>
      )}
    </Dialog>
  )
}

function Folded({ record }: { record: SignedRecord }) {
  return (
    <details>
      <summary className="hs-link inline-block min-h-8 cursor-pointer">Show all that is signed</summary>
      <div className="mt-2">
        <WhatIsSigned record={record} />
      </div>
    </details>
  )
}

interface PreparationQuery {
  data: Preparation | undefined
  error: Error | null
  isFetching: boolean
  refetch: () => Promise<unknown>
}

function Prepared({
  preparation,
  onGo,
  children,
}: {
  preparation: PreparationQuery
  onGo: () => void
  children: ReactNode
}) {
  const { data, error, isFetching } = preparation
  if (error)
    return (
      <DialogPart>
        <Message kind="fault" title="The bytes to sign could not be prepared.">
          {sentenceOf(error)}
        </Message>
      </DialogPart>
    )
  if (!data || (isFetching && data.state !== 'ready'))
    return (
      <DialogPart>
        <p role="status">Saving, and preparing what is signed</p>
      </DialogPart>
    )
  if (data.state === 'blocked')
    return (
      <DialogPart>
        <p className="mb-2">This sheet cannot be signed yet:</p>
        <BlocksList entry={data.entry} onGo={onGo} onMended={() => void preparation.refetch()} />
      </DialogPart>
    )
  if (data.state === 'no-key')
    return (
      <DialogPart>
        <NoKey status={data.key.status} />
      </DialogPart>
    )
  return <>{children}</>
}

const keyWords: Record<string, string> = {
  none: 'You have no signing key yet.',
  'awaiting-endorsement':
    'Your signing key is not endorsed yet. A manager or a supervisor checks who you are and endorses it.',
  expired: 'The certificate of your signing key has ended.',
  revoked: 'Your signing key was revoked.',
}

function NoKey({ status }: { status: string }) {
  return (
    <Message
      kind="warn"
      actions={
        <ButtonLink to="/keys" size="small">
          Signing key
        </ButtonLink>
      }
    >
      {keyWords[status] ?? 'Your signing key cannot be used now.'} What you wrote is safe.
    </Message>
  )
}

import { useState, type ReactNode } from 'react'
import { sentenceOf } from '../../../lib/api-problem.ts'
import { Button } from '../../../ui/button.tsx'
import { Dialog, DialogPart } from '../../../ui/dialog.tsx'
import { TextArea } from '../../../ui/field.tsx'
import { Message } from '../../../ui/message.tsx'

/** The part of a mutation that the dialog needs. */
export interface ReasonedAct {
  mutate: (reason: string, options: { onSuccess: () => void }) => void
  isPending: boolean
  error: Error | null
  reset: () => void
}

/** An act that needs a reason. The reason stays in the record; the harmless choice leaves all as it is. */
export function ReasonDialog({
  open,
  onClose,
  onDone,
  title,
  about,
  verb,
  danger,
  harmless,
  act,
}: {
  open: boolean
  onClose: () => void
  onDone: () => void
  title: string
  about: ReactNode
  verb: string
  danger?: boolean
  harmless: string
  act: ReasonedAct
}) {
  const [reason, setReason] = useState('')
  const [missing, setMissing] = useState(false)
  const close = () => {
    setMissing(false)
    act.reset()
    onClose()
  }
  function submit() {
    if (reason.trim() === '') return setMissing(true)
    act.mutate(reason.trim(), {
      onSuccess: () => {
        setReason('')
        onDone()
      },
    })
  }
  return (
    <Dialog
      open={open}
      onClose={close}
      locked={act.isPending}
      title={title}
      about={about}
      actions={
        <>
          <Button kind={danger ? 'danger' : 'primary'} busy={act.isPending} onClick={submit}>
            {verb}
          </Button>
          <Button onClick={close}>{harmless}</Button>
        </>
      }
    >
      <DialogPart>
        <TextArea
          label="Reason, kept in the record"
          value={reason}
          maxLength={2000}
          error={missing ? 'Give a reason: it stays beside the entry for whoever reads it later.' : null}
          onChange={(event) => {
            setMissing(false)
            setReason(event.target.value)
          }}
        />
      </DialogPart>
      {act.error && (
        <Message kind="fault" title="Nothing was changed.">
          {sentenceOf(act.error)}
        </Message>
      )}
    </Dialog>
  )
}

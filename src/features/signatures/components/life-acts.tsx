import { useState } from 'react'
import { useNavigate } from 'react-router-dom'
import type { Entry } from '../../../../server/contract/entries.ts'
import { sentenceOf } from '../../../lib/api-problem.ts'
import { Button } from '../../../ui/button.tsx'
import { Dialog, DialogPart } from '../../../ui/dialog.tsx'
import { TextField } from '../../../ui/field.tsx'
import { Message } from '../../../ui/message.tsx'
import { useCreateAddendum, useReturnEntry, useWithdrawEntry } from '../mutations.ts'
import { ReasonDialog } from './reason-dialog.tsx'

/** Acts of an author on a sheet beside signing it: reopen, recall, withdraw, add an addendum; those open to the person. */
export function LifeActs({ entry, me }: { entry: Entry; me: { id: string } }) {
  const author = entry.authors.some((each) => each.personId === me.id)
  return (
    <>
      {entry.allowed.includes('reopen') && <ReopenAct entry={entry} />}
      {entry.allowed.includes('return') && author && <RecallAct entry={entry} />}
      {entry.allowed.includes('withdraw') && <WithdrawAct entry={entry} />}
      {entry.allowed.includes('addendum') && <AddendumAct entry={entry} />}
    </>
  )
}

function ReopenAct({ entry }: { entry: Entry }) {
  const [open, setOpen] = useState(false)
  return (
    <>
      <Button onClick={() => setOpen(true)}>Reopen</Button>
      <ReasonDialog
        open={open}
        onClose={() => setOpen(false)}
        onDone={() => setOpen(false)}
        title={`Reopen ${entry.number}`}
        about="The text can change again. The signatures given so far become void; they stay in the record."
        verb="Reopen"
        harmless="Leave it locked"
        act={useReturnEntry(entry.id)}
      />
    </>
  )
}

function RecallAct({ entry }: { entry: Entry }) {
  const [open, setOpen] = useState(false)
  return (
    <>
      <Button onClick={() => setOpen(true)}>Recall</Button>
      <ReasonDialog
        open={open}
        onClose={() => setOpen(false)}
        onDone={() => setOpen(false)}
        title={`Recall ${entry.number}`}
        about="It comes back from the witness and can change again. Your signature on this revision becomes void; it stays in the record."
        verb="Recall"
        harmless="Leave it with the witness"
        act={useReturnEntry(entry.id)}
      />
    </>
  )
}

/** The witness's other answer: back to the author, with a reason. */
export function ReturnAct({ entry, onReturned }: { entry: Entry; onReturned: () => void }) {
  const [open, setOpen] = useState(false)
  return (
    <>
      <Button onClick={() => setOpen(true)}>Return to author</Button>
      <ReasonDialog
        open={open}
        onClose={() => setOpen(false)}
        onDone={() => {
          setOpen(false)
          onReturned()
        }}
        title={`Return ${entry.number} to its author`}
        about="The author reads your reason and can change the sheet. The signatures given become void; they stay in the record."
        verb="Return to author"
        harmless="Keep reading"
        act={useReturnEntry(entry.id)}
      />
    </>
  )
}

function WithdrawAct({ entry }: { entry: Entry }) {
  const [open, setOpen] = useState(false)
  return (
    <>
      <Button kind="quiet" onClick={() => setOpen(true)}>
        Withdraw
      </Button>
      <ReasonDialog
        open={open}
        onClose={() => setOpen(false)}
        onDone={() => setOpen(false)}
        title={`Withdraw ${entry.number}`}
        about="The sheet is put aside for good. It keeps its number, stays readable for ever, and can be neither changed nor signed."
        verb="Withdraw"
        danger
        harmless="Keep it"
        act={useWithdrawEntry(entry.id)}
      />
    </>
  )
}

function AddendumAct({ entry }: { entry: Entry }) {
  const [open, setOpen] = useState(false)
  const [title, setTitle] = useState(`Addendum to ${entry.number}`)
  const create = useCreateAddendum(entry.id)
  const navigate = useNavigate()
  const add = () => create.mutate(title.trim(), { onSuccess: ({ id }) => void navigate(`/entries/${id}`) })
  return (
    <>
      <Button icon="plus" onClick={() => setOpen(true)}>
        Add an addendum
      </Button>
      <Dialog
        open={open}
        onClose={() => setOpen(false)}
        locked={create.isPending}
        title={`Add an addendum to ${entry.number}`}
        about="A sealed sheet never changes. An addendum is a new sheet in the same notebook that amends it, with signatures of its own; each names the other."
        actions={
          <>
            <Button kind="primary" busy={create.isPending} onClick={add}>
              Add an addendum
            </Button>
            <Button onClick={() => setOpen(false)}>Leave it as it is</Button>
          </>
        }
      >
        <DialogPart>
          <TextField
            label="Title"
            value={title}
            maxLength={300}
            onChange={(event) => setTitle(event.target.value)}
          />
        </DialogPart>
        {create.error && <Message kind="fault">{sentenceOf(create.error)}</Message>}
      </Dialog>
    </>
  )
}

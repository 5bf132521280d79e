import { useState, type FormEvent } from 'react'
import { sentenceOf } from '../../lib/api-problem.ts'
import { Button } from '../../ui/button.tsx'
import { Dialog } from '../../ui/dialog.tsx'
import { TextField } from '../../ui/field.tsx'
import { useCreateNotebook } from './mutations.ts'

/** Asks for the title of a new notebook. */
export function NewNotebook({
  onCreated,
  onClose,
}: {
  onCreated: (id: string) => void
  onClose: () => void
}) {
  const [title, setTitle] = useState('')
  const create = useCreateNotebook()

  function submit(event: FormEvent) {
    event.preventDefault()
    if (title.trim() !== '') create.mutate(title.trim(), { onSuccess: ({ id }) => onCreated(id) })
  }

  return (
    <Dialog
      open
      onClose={onClose}
      locked={create.isPending}
      title="New notebook"
      about="A notebook holds the sheets of one piece of research. You keep it: you add the people who write, witness and read in it."
    >
      <form className="hs-form" onSubmit={submit}>
        <TextField
          label="Title"
          value={title}
          maxLength={200}
          error={create.isError ? sentenceOf(create.error) : null}
          onChange={(event) => setTitle(event.target.value)}
        />
        <div className="hs-actions">
          <Button kind="primary" type="submit" busy={create.isPending}>
            Create
          </Button>
          <Button onClick={onClose}>Do not create</Button>
        </div>
      </form>
    </Dialog>
  )
}

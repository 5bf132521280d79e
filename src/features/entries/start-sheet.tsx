import { useState, type FormEvent } from 'react'
import type { Experiment } from '../../../server/contract/common.ts'
import type { Notebook } from '../../../server/contract/notebooks.ts'
import { sentenceOf } from '../../lib/api-problem.ts'
import { Button } from '../../ui/button.tsx'
import { Dialog } from '../../ui/dialog.tsx'
import { TextField } from '../../ui/field.tsx'
import { Message } from '../../ui/message.tsx'
import { Select } from '../../ui/select.tsx'
import { experimentNames } from './experiments.ts'
import { useStartSheet } from './mutations.ts'

export interface SheetStart {
  experiment: Experiment
  title: string
  withHeads: boolean
}

interface StartSheetProps {
  start: SheetStart
  /** Notebooks the person may write in; the first is offered. */
  notebooks: Notebook[]
  onStarted: (entryId: string) => void
  onClose: () => void
}

const experimentChoices = (Object.keys(experimentNames) as Experiment[]).map((value) => ({
  value,
  label: experimentNames[value],
}))

/** Asks only for what a sheet needs to exist: notebook, title, experiment. Enter starts it. */
export function StartSheet({ start, notebooks, onStarted, onClose }: StartSheetProps) {
  const [title, setTitle] = useState(start.title)
  const [experiment, setExperiment] = useState(start.experiment)
  const [notebookId, setNotebookId] = useState(notebooks[0]?.id ?? '')
  const startSheet = useStartSheet()

  function submit(event: FormEvent) {
    event.preventDefault()
    if (title.trim() === '' || notebookId === '') return
    startSheet.mutate(
      { notebookId, title: title.trim(), experiment, withHeads: start.withHeads },
      { onSuccess: (entry) => onStarted(entry.id) },
    )
  }

  return (
    <Dialog open onClose={onClose} locked={startSheet.isPending} title="Start a sheet">
      <form className="hs-form" onSubmit={submit}>
        <TextField
          label="Title"
          value={title}
          maxLength={300}
          error={title.trim() === '' ? 'Give the sheet a title.' : null}
          onChange={(event) => setTitle(event.target.value)}
          onFocus={(event) => event.target.select()}
        />
        <Select label="Experiment" choices={experimentChoices} value={experiment} onChange={setExperiment} />
        <Select
          label="Notebook"
          choices={notebooks.map(({ id, number, title: name }) => ({
            value: id,
            label: `${number} ${name}`,
          }))}
          value={notebookId}
          onChange={setNotebookId}
        />
        {startSheet.isError && <Message kind="fault">{sentenceOf(startSheet.error)}</Message>}
        <div className="hs-actions">
          <Button kind="primary" type="submit" busy={startSheet.isPending}>
            Start
          </Button>
          <Button onClick={onClose}>Do not start</Button>
        </div>
      </form>
    </Dialog>
  )
}

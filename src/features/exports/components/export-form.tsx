import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { sentenceOf } from '../../../lib/api-problem.ts'
import { Button } from '../../../ui/button.tsx'
import { Checkbox } from '../../../ui/checkbox.tsx'
import { Message } from '../../../ui/message.tsx'
import { Select } from '../../../ui/select.tsx'
import { useStartExport, type ExportChoice } from '../mutations.ts'
import { entriesToExportQuery, exportableNotebooksQuery, exportQuery } from '../queries.ts'
import { BundleState } from './bundle-state.tsx'

/** Export of a notebook, or of some of its sealed entries, as a bundle that needs no Halfsilver to be checked. */
export function ExportForm() {
  const notebooks = useQuery(exportableNotebooksQuery)
  const [notebookId, setNotebookId] = useState<string | null>(null)
  const chosenId = notebookId ?? notebooks.data?.[0]?.id ?? null
  if (notebooks.error) return <Message kind="warn">{sentenceOf(notebooks.error)}</Message>
  if (!notebooks.data) return <p className="hs-quiet">Reading the notebooks</p>
  if (chosenId === null) return <p>You may export from no notebook. Its keeper can add you as an auditor.</p>
  return (
    <div className="grid gap-3.5">
      <Select
        label="Notebook"
        choices={notebooks.data.map((each) => ({ value: each.id, label: `${each.number} ${each.title}` }))}
        value={chosenId}
        onChange={setNotebookId}
      />
      <NotebookExport key={chosenId} notebookId={chosenId} />
    </div>
  )
}

function NotebookExport({ notebookId }: { notebookId: string }) {
  const entries = useQuery(entriesToExportQuery(notebookId))
  const [chosen, setChosen] = useState<string[] | null>(null)
  const [withRaw, setWithRaw] = useState(true)
  const sealed = entries.data?.filter((entry) => entry.state === 'sealed') ?? []
  const open = (entries.data?.length ?? 0) - sealed.length
  const toggle = (id: string, on: boolean) =>
    setChosen(on ? [...(chosen ?? []), id] : (chosen ?? []).filter((each) => each !== id))
  const nothing =
    sealed.length === 0
      ? 'No entry of this notebook is sealed yet.'
      : chosen?.length === 0
        ? 'Choose at least one entry.'
        : null
  return (
    <>
      <Select
        label="Put in"
        choices={[
          { value: 'all', label: `The whole notebook, ${sealed.length} sealed` },
          { value: 'some', label: 'Chosen entries' },
        ]}
        value={chosen === null ? 'all' : 'some'}
        onChange={(which) => setChosen(which === 'all' ? null : [])}
      />
      {chosen !== null && (
        <fieldset className="grid max-h-64 gap-2 overflow-y-auto">
          <legend className="hs-label">Sealed entries</legend>
          {sealed.map((entry) => (
            <Checkbox
              key={entry.id}
              label={<span className="hs-fig">{entry.number}</span>}
              hint={entry.title}
              checked={chosen.includes(entry.id)}
              onChange={(on) => toggle(entry.id, on)}
            />
          ))}
        </fieldset>
      )}
      <RawChoice withRaw={withRaw} onChange={setWithRaw} />
      {chosen === null && open > 0 && (
        <p className="hs-message">
          {open === 1 ? 'One entry is not sealed. It is' : `${open} entries are not sealed. They are`} named
          in the bundle as left out, since only sealed ones can be proved.
        </p>
      )}
      <ExportAct
        choice={
          chosen === null ? { notebookId, withoutRaw: !withRaw } : { entryIds: chosen, withoutRaw: !withRaw }
        }
        disabledReason={entries.data ? nothing : 'Reading the entries.'}
      />
    </>
  )
}

export function RawChoice({ withRaw, onChange }: { withRaw: boolean; onChange: (withRaw: boolean) => void }) {
  return (
    <Checkbox
      label="Raw files"
      hint={
        withRaw
          ? 'All bytes are inside; the figures can be computed again from them.'
          : 'The bundle names each raw file by its digest and says that it was left out. A check then reports it as missing.'
      }
      checked={withRaw}
      onChange={onChange}
    />
  )
}

/** The button and what became of it, in the same place. */
export function ExportAct({
  choice,
  disabledReason,
}: {
  choice: ExportChoice
  disabledReason: string | null
}) {
  const start = useStartExport()
  const id = start.data?.id
  const bundle = useQuery({ ...exportQuery(id ?? ''), enabled: id !== undefined })
  return (
    <div className="grid gap-3.5" aria-live="polite">
      <div>
        <Button
          kind={bundle.data?.status === 'done' ? 'plain' : 'primary'}
          icon="download"
          disabledReason={disabledReason}
          busy={start.isPending}
          onClick={() => start.mutate(choice)}
        >
          {start.isPending ? 'Exporting' : 'Export and sign'}
        </Button>
      </div>
      {start.error && (
        <Message kind="fault" title="The export did not start.">
          {sentenceOf(start.error)}
        </Message>
      )}
      {bundle.data && <BundleState bundle={bundle.data} />}
    </div>
  )
}

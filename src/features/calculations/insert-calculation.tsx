import { useQuery } from '@tanstack/react-query'
import { useState, type FormEvent } from 'react'
import type { CalculationKind } from '../../../server/contract/calculations.ts'
import type { RawFile } from '../../../server/contract/files.ts'
import { ApiProblem, sentenceOf } from '../../lib/api-problem.ts'
import { Button } from '../../ui/button.tsx'
import { Dialog } from '../../ui/dialog.tsx'
import { Message } from '../../ui/message.tsx'
import { Select } from '../../ui/select.tsx'
import type { JsonSchema } from './json-schema.ts'
import { useStartCalculations } from './mutations.ts'
import { ParameterRow } from './parameter-row.tsx'
import { kindsQuery } from './queries.ts'
import { startParameters } from './start-parameters.ts'

interface InsertCalculationProps {
  entryId: string
  files: RawFile[]
  /** Ids of the calculations started, to be placed in the text. */
  onStarted: (ids: string[]) => void
  onClose: () => void
}

/** Chooses what to compute and from which file, and starts it; everything can be changed later in its block. */
export function InsertCalculation({ entryId, files, onStarted, onClose }: InsertCalculationProps) {
  const { data: kinds, error } = useQuery(kindsQuery)
  const start = useStartCalculations(entryId)
  const [kindName, setKindName] = useState<string | null>(null)
  const [fileId, setFileId] = useState<string | null>(null)
  const [given, setGiven] = useState<Record<string, unknown> | null>(null)
  const kind = kinds?.items.find((each) => each.kind === kindName) ?? kinds?.items[0]
  const fitting = kind ? files.filter((file) => fits(file, kind)) : []
  const file = fitting.find((each) => each.id === fileId) ?? fitting.at(-1)
  const needsFile = kind !== undefined && kind.inputs.min > 0
  const parameters = given ?? (kind ? startParameters(kind, file) : {})
  const refused = start.error instanceof ApiProblem ? start.error.errors : []

  function submit(event: FormEvent) {
    event.preventDefault()
    if (!kind || (needsFile && !file)) return
    const inputs = file ? [{ fileId: file.id }] : []
    start.mutate([{ kind: kind.kind, inputs, parameters }], {
      onSuccess: (started) => onStarted(started.map(({ id }) => id)),
    })
  }

  return (
    <Dialog open onClose={onClose} locked={start.isPending} title="Calculation" about={kind?.summary}>
      <form className="hs-form" onSubmit={submit}>
        {error && <Message kind="fault">{sentenceOf(error)}</Message>}
        <Select
          label="What to compute"
          choices={(kinds?.items ?? []).map((each) => ({ value: each.kind, label: each.title }))}
          value={kind?.kind ?? null}
          onChange={(chosen) => {
            setKindName(chosen)
            setGiven(null)
          }}
        />
        {needsFile && (
          <Select
            label="From"
            choices={fitting.map(({ id, name }) => ({ value: id, label: name }))}
            value={file?.id ?? null}
            error={fitting.length === 0 ? 'No file of this sheet can be used. Attach one first.' : null}
            onChange={(chosen) => {
              setFileId(chosen)
              setGiven(null)
            }}
          />
        )}
        {kind && (
          <ParameterRow
            schema={kind.parameters as JsonSchema}
            parameters={parameters}
            disabled={start.isPending}
            errors={refused}
            onChange={setGiven}
          />
        )}
        {start.isError && refused.length === 0 && <Message kind="fault">{sentenceOf(start.error)}</Message>}
        <div className="hs-actions">
          <Button
            kind="primary"
            type="submit"
            busy={start.isPending}
            disabledReason={needsFile && !file ? 'It needs a file.' : null}
          >
            Compute
          </Button>
          <Button onClick={onClose}>Do not compute</Button>
        </div>
      </form>
    </Dialog>
  )
}

/** A file that is still being read may be used: the calculation waits for it. */
function fits({ reading }: RawFile, { inputs }: CalculationKind): boolean {
  if (reading.status === 'pending') return true
  return reading.status === 'ready' && reading.kind !== null && inputs.accepts.includes(reading.kind)
}

import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import type { Calculation } from '../../../../server/contract/calculations.ts'
import { sentenceOf } from '../../../lib/api-problem.ts'
import { figureInFull } from '../../../lib/format-quantity.ts'
import { stampTime } from '../../../lib/times.ts'
import { Button, TextButton } from '../../../ui/button.tsx'
import { Digest } from '../../../ui/digest.tsx'
import { Dialog, DialogPart } from '../../../ui/dialog.tsx'
import { Message } from '../../../ui/message.tsx'
import { Facts } from '../../../ui/sheet.tsx'
import { calculationQuery } from '../queries.ts'

/** Opens a calculation for the witness: figures, parameters, inputs and notes; its curve stands on the sheet. */
export function CalculationPeek({ id, label }: { id: string; label: string }) {
  const [open, setOpen] = useState(false)
  const { data, error } = useQuery({ ...calculationQuery(id), enabled: open })
  return (
    <>
      <TextButton onClick={() => setOpen(true)}>Open {label}</TextButton>
      <Dialog
        open={open}
        onClose={() => setOpen(false)}
        wide
        title={label}
        about={data ? `${data.kind}, version ${data.version}` : 'Opening'}
        actions={<Button onClick={() => setOpen(false)}>Close</Button>}
      >
        {error && <Message kind="fault">{sentenceOf(error)}</Message>}
        {data && <CalculationFacts calculation={data} />}
      </Dialog>
    </>
  )
}

function CalculationFacts({ calculation }: { calculation: Calculation }) {
  const { figures, parameters, inputs, notes, provenance } = calculation
  return (
    <>
      <DialogPart>
        <Facts facts={figures.map((figure) => ({ name: figure.label, value: figureInFull(figure) }))} />
      </DialogPart>
      <DialogPart>
        <p className="hs-label">Parameters</p>
        <Facts
          facts={Object.entries(parameters).map(([name, value]) => ({ name, value: JSON.stringify(value) }))}
        />
      </DialogPart>
      <DialogPart>
        <p className="hs-label">Inputs</p>
        <ul className="grid gap-1">
          {inputs.map((input) => (
            <li key={'fileId' in input ? input.fileId : input.calculationId + input.pointer}>
              {'fileId' in input ? (
                <>
                  {input.name} <Digest sha256={input.sha256} />
                </>
              ) : (
                <>
                  another result <Digest sha256={input.resultSha256} />
                </>
              )}
            </li>
          ))}
        </ul>
        {provenance && (
          <p className="hs-quiet mt-2">
            engine {provenance.engine}, computed {stampTime(provenance.finishedAt)}
          </p>
        )}
      </DialogPart>
      {notes.map((note) => (
        <div className="mt-3" key={note.code}>
          <Message kind="warn" code={note.code}>
            {note.detail}
          </Message>
        </div>
      ))}
    </>
  )
}

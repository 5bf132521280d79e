import type { Entry } from '../../../server/contract/entries.ts'
import { canStartSet, standardSetName } from '../../features/calculations/standard-set.ts'
import { useInputsUsed } from '../../features/calculations/use-inputs-used.ts'
import { FileChip } from '../../features/files/file-chip.tsx'
import '../../features/files/files.css'
import { useAddRun } from '../../features/runs/mutations.ts'
import { RunPart } from '../../features/runs/run-part.tsx'
import '../../features/runs/runs.css'
import { sentenceOf } from '../../lib/api-problem.ts'
import { Button } from '../../ui/button.tsx'
import { Message } from '../../ui/message.tsx'
import { filesOf } from './use-open-entry.ts'

interface SheetMarginProps {
  entry: Entry
  editable: boolean
  /** Starts the standard calculations of a file; null where the sheet is only read. */
  onStandardSet: ((fileId: string) => void) | null
}

/** Beside the text: runs with their conditions, files with their marks. Each child hangs by a lead from the rule. */
export function SheetMargin({ entry, editable, onStandardSet }: SheetMarginProps) {
  const used = useInputsUsed(entry.calculations.map(({ id }) => id))
  return (
    <>
      {entry.runs.map((run) => (
        <RunPart key={run.id} run={run} entryId={entry.id} editable={editable} />
      ))}
      {editable && entry.runs.length === 0 && <BeginRun entry={entry} />}
      {filesOf(entry).map((file) => (
        <div key={file.id} id={file.id} tabIndex={-1} data-beside={used.get(file.id)?.join(' ')}>
          <FileChip
            file={file}
            editable={editable}
            acts={
              onStandardSet && canStartSet(file) && !used.has(file.id) ? (
                <Button size="small" kind="primary" onClick={() => onStandardSet(file.id)}>
                  {standardSetName}
                </Button>
              ) : null
            }
          />
        </div>
      ))}
    </>
  )
}

/** A record that is dropped begins a run by itself; this is for noting the conditions before there is one. */
function BeginRun({ entry }: { entry: Entry }) {
  const add = useAddRun(entry.id)
  return (
    <div className="hs-attach">
      <Button
        size="small"
        icon="plus"
        busy={add.isPending}
        onClick={() => add.mutate({ experiment: entry.experiment })}
      >
        Begin a run
      </Button>
      <span className="hs-quiet">to note its conditions; a record dropped here begins one too</span>
      {add.isError && <Message kind="fault">{sentenceOf(add.error)}</Message>}
    </div>
  )
}

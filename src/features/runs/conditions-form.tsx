import { useState, type FormEvent } from 'react'
import type { Condition, Run } from '../../../server/contract/runs.ts'
import { sentenceOf } from '../../lib/api-problem.ts'
import { laboratoryZone, zoneInWords } from '../../lib/times.ts'
import { utcOfZoned, zonedOfUtc } from '../../lib/zoned-time.ts'
import { Button } from '../../ui/button.tsx'
import { Message } from '../../ui/message.tsx'
import { conditionFrom, lineOf, type ConditionLine } from './condition-text.ts'
import { useChangeRun } from './mutations.ts'

const blank: ConditionLine = { name: '', value: '', unit: '' }
/** What is usually noted of a run; offered where nothing is noted yet (common practice). */
const usual: ConditionLine[] = [
  { name: 'Temperature', value: '', unit: 'K' },
  { name: 'Drive wavelength', value: '', unit: 'nm' },
  { name: 'Drive power', value: '', unit: 'µW' },
]

/** Conditions as lines of name, value and unit. A value may carry its uncertainty: 4.2 ± 0.1. */
export function ConditionsForm({
  run,
  entryId,
  onClose,
}: {
  run: Run
  entryId: string
  onClose: () => void
}) {
  const [lines, setLines] = useState(() => (run.conditions.length > 0 ? run.conditions.map(lineOf) : usual))
  const [started, setStarted] = useState(() => zonedOfUtc(run.startedAt, laboratoryZone()))
  const [refusal, setRefusal] = useState<string | null>(null)
  const change = useChangeRun(run.id, entryId)

  function set(at: number, part: Partial<ConditionLine>) {
    setLines(lines.map((line, index) => (index === at ? { ...line, ...part } : line)))
  }

  function submit(event: FormEvent) {
    event.preventDefault()
    const meant = lines.filter((line) => line.value.trim() !== '').map(conditionFrom)
    const refused = meant.find((each) => each !== null && 'refusal' in each)
    if (refused && 'refusal' in refused) return setRefusal(refused.refusal)
    const startedAt = utcOfZoned(started, laboratoryZone())
    if (startedAt === null) return setRefusal('The start is a date and a time, for example 2026-11-12 10:56.')
    setRefusal(null)
    const untouched = started === zonedOfUtc(run.startedAt, laboratoryZone())
    change.mutate(
      { conditions: meant as Condition[], ...(untouched ? {} : { startedAt }) },
      { onSuccess: onClose },
    )
  }

  return (
    <form className="hs-conditions" onSubmit={submit}>
      <label className="hs-conditions-start">
        <span className="hs-quiet">Started ({zoneInWords(new Date(run.startedAt))})</span>
        <input className="hs-fig" value={started} onChange={(event) => setStarted(event.target.value)} />
      </label>
      {lines.map((line, at) => (
        <fieldset key={at}>
          <legend className="hs-only-spoken">Condition {at + 1}</legend>
          <input
            aria-label="Name"
            placeholder="name"
            value={line.name}
            onChange={(e) => set(at, { name: e.target.value })}
          />
          <input
            className="hs-fig"
            aria-label={`Value of ${line.name || 'the condition'}`}
            placeholder="value"
            value={line.value}
            onChange={(e) => set(at, { value: e.target.value })}
          />
          <input
            aria-label="Unit"
            placeholder="unit"
            value={line.unit}
            onChange={(e) => set(at, { unit: e.target.value })}
          />
        </fieldset>
      ))}
      {refusal && <Message kind="fault">{refusal}</Message>}
      {change.isError && <Message kind="fault">{sentenceOf(change.error)}</Message>}
      <div className="hs-actions">
        <Button size="small" icon="plus" onClick={() => setLines([...lines, blank])}>
          Line
        </Button>
        <Button size="small" type="submit" busy={change.isPending}>
          Keep
        </Button>
        <Button size="small" kind="quiet" onClick={onClose}>
          Leave it
        </Button>
      </div>
    </form>
  )
}

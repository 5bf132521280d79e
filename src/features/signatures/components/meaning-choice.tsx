import { useState } from 'react'
import type { Entry } from '../../../../server/contract/entries.ts'
import { zoneInWords } from '../../../lib/times.ts'
import { Button } from '../../../ui/button.tsx'
import { TextField } from '../../../ui/field.tsx'
import { OptionRow } from '../../../ui/option-row.tsx'
import { Select } from '../../../ui/select.tsx'
import { presenceTrouble, spanOfRun } from '../presence.ts'
import type { Presence } from '../signing.ts'
import { utcOfZoned, zonedOfUtc } from '../../../lib/zoned-time.ts'

export type WitnessMeaning = 'witness-read' | 'witness-present'
type Run = Entry['runs'][number]

/** What the witness's signature is to say. The two meanings are shown and printed apart, and never merged. */
export function MeaningChoice({
  entry,
  zone,
  meaning,
  onMeaning,
  presence,
  onPresence,
}: {
  entry: Entry
  zone: string
  meaning: WitnessMeaning
  onMeaning: (meaning: WitnessMeaning) => void
  presence: Presence | null
  onPresence: (presence: Presence | null) => void
}) {
  const mayBePresent = entry.allowed.includes('witness:present') && entry.runs.length > 0
  return (
    <div className="grid gap-3">
      {mayBePresent && (
        <OptionRow
          label="What your signature says"
          options={[
            { value: 'witness-read', label: 'I read and understood it' },
            { value: 'witness-present', label: 'I was present' },
          ]}
          value={meaning}
          onChange={onMeaning}
        />
      )}
      {meaning === 'witness-read' ? (
        <p className="hs-quiet">
          It says that this page existed when you signed, not that its statements are true.
        </p>
      ) : (
        <PresenceTimes runs={entry.runs} zone={zone} presence={presence} onPresence={onPresence} />
      )}
    </div>
  )
}

function PresenceTimes({
  runs,
  zone,
  presence,
  onPresence,
}: {
  runs: Run[]
  zone: string
  presence: Presence | null
  onPresence: (presence: Presence | null) => void
}) {
  const [runId, setRunId] = useState(runs[0]?.id ?? '')
  const run = runs.find((each) => each.id === runId)
  const [from, setFrom] = useState(run ? zonedOfUtc(spanOfRun(run).from, zone) : '')
  const [to, setTo] = useState(run ? zonedOfUtc(spanOfRun(run).to, zone) : '')
  const trouble = run ? presenceTrouble(run, utcOfZoned(from, zone), utcOfZoned(to, zone)) : 'Choose the run.'

  function chooseRun(id: string) {
    const chosen = runs.find((each) => each.id === id)
    setRunId(id)
    if (!chosen) return
    setFrom(zonedOfUtc(spanOfRun(chosen).from, zone))
    setTo(zonedOfUtc(spanOfRun(chosen).to, zone))
    onPresence(null)
  }

  function use() {
    const [fromUtc, toUtc] = [utcOfZoned(from, zone), utcOfZoned(to, zone)]
    if (trouble === null && fromUtc && toUtc) onPresence({ runId, from: fromUtc, to: toUtc })
  }

  const changed = (set: (text: string) => void) => (text: string) => {
    set(text)
    onPresence(null)
  }
  return (
    <>
      <Select
        label="Run you saw"
        choices={runs.map((each) => ({
          value: each.id,
          label: `${each.number}, ${zonedOfUtc(each.startedAt, zone)}`,
        }))}
        value={runId}
        onChange={chooseRun}
      />
      <div className="grid gap-3 mid:grid-cols-2">
        <TextField
          label="Present from"
          value={from}
          onChange={(event) => changed(setFrom)(event.target.value)}
        />
        <TextField label="to" value={to} onChange={(event) => changed(setTo)(event.target.value)} />
      </div>
      <p className="hs-hint">Year-month-day and time, {zoneInWords()}. The times must overlap the run.</p>
      {presence === null && (
        <div>
          <Button size="small" disabledReason={trouble} onClick={use}>
            Use these times
          </Button>
        </div>
      )}
    </>
  )
}

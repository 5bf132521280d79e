import { useState, type FormEvent } from 'react'
import type { RawFile } from '../../../server/contract/files.ts'
import { ApiProblem, sentenceOf } from '../../lib/api-problem.ts'
import { Button, TextButton } from '../../ui/button.tsx'
import { TextField } from '../../ui/field.tsx'
import { Message } from '../../ui/message.tsx'
import { Select } from '../../ui/select.tsx'
import { useSetReading } from './queries.ts'

const units = ['ps', 'ns', 'us', 'ticks'] as const
type Unit = (typeof units)[number]
const unitNames: Record<Unit, string> = {
  ps: 'picoseconds',
  ns: 'nanoseconds',
  us: 'microseconds',
  ticks: 'ticks of a clock',
}

/** Says by hand which columns hold time and channel, and in which unit: for text whose header does not tell. */
export function ReadingForm({ file }: { file: RawFile }) {
  const { reading } = file
  const given = reading.options ?? {}
  const [open, setOpen] = useState(reading.status === 'unreadable')
  const [time, setTime] = useState(textOf(given.time))
  const [channel, setChannel] = useState(textOf(given.channel))
  const [unit, setUnit] = useState<Unit>(units.find((each) => each === given.unit) ?? 'ps')
  const [tickPs, setTickPs] = useState(textOf(given.tickPs))
  const set = useSetReading(file.id)

  if (!open) return <TextButton onClick={() => setOpen(true)}>Correct the reading</TextButton>

  function submit(event: FormEvent) {
    event.preventDefault()
    const options = { ...given, time, channel, unit, ...(unit === 'ticks' ? { tickPs } : {}) }
    if (unit !== 'ticks') delete (options as Record<string, unknown>).tickPs
    set.mutate({ format: 'delimited', options }, { onSuccess: () => setOpen(false) })
  }

  const wrong = (name: string) =>
    set.error instanceof ApiProblem
      ? (set.error.errors.find((each) => each.pointer.endsWith(`/${name}`))?.detail ?? null)
      : null

  return (
    <form className="hs-form" onSubmit={submit}>
      <TextField
        label="Column of times"
        hint="Its header, or col1, col2 where there is none"
        value={time}
        error={wrong('time')}
        onChange={(event) => setTime(event.target.value)}
      />
      <TextField
        label="Column of channels"
        value={channel}
        error={wrong('channel')}
        onChange={(event) => setChannel(event.target.value)}
      />
      <Select
        label="Unit of the times"
        choices={units.map((value) => ({ value, label: unitNames[value] }))}
        value={unit}
        error={wrong('unit')}
        onChange={setUnit}
      />
      {unit === 'ticks' && (
        <TextField
          label="Length of a tick / ps"
          value={tickPs}
          error={wrong('tickPs')}
          onChange={(event) => setTickPs(event.target.value)}
        />
      )}
      {set.isError && <Message kind="fault">{sentenceOf(set.error)}</Message>}
      <div className="hs-actions">
        <Button size="small" type="submit" busy={set.isPending}>
          Read it so
        </Button>
        <Button size="small" kind="quiet" onClick={() => setOpen(false)}>
          Leave it
        </Button>
      </div>
    </form>
  )
}

function textOf(value: unknown): string {
  return typeof value === 'string' || typeof value === 'number' ? String(value) : ''
}

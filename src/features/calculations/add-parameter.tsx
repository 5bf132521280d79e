import { useState } from 'react'
import { TextButton } from '../../ui/button.tsx'
import { ParameterChoice, ParameterField } from '../../ui/parameter-field.tsx'
import { pointerOf, type AbsentParameter, type Path } from './parameter-fields.ts'

/** Adds a parameter that is not given; those by channel ask for the channel first. */
export function AddParameter({
  absent,
  onAdd,
}: {
  absent: AbsentParameter[]
  onAdd: (path: Path, value: unknown) => void
}) {
  const [asking, setAsking] = useState<AbsentParameter | null>(null)
  if (absent.length === 0) return null

  function choose(pointer: string) {
    const chosen = absent.find((each) => pointerOf(each.path) === pointer)
    if (!chosen) return
    if (chosen.keyed) setAsking(chosen)
    else onAdd(chosen.path, chosen.start)
  }

  if (asking) {
    return (
      <span className="hs-parameter-slot">
        <ParameterField
          label={`${asking.label}: for channel`}
          value=""
          check={(text) => (/^\d{1,5}$/.test(text) ? null : 'Name a channel by its number.')}
          onCommit={(key) => {
            setAsking(null)
            onAdd([...asking.path, key], asking.start)
          }}
        />
        <TextButton className="hs-parameter-remove" onClick={() => setAsking(null)}>
          Do not add
        </TextButton>
      </span>
    )
  }
  return (
    <ParameterChoice
      label="Add"
      value=""
      choices={absent.map(({ path, label, help }) => ({ value: pointerOf(path), label, note: help }))}
      onCommit={choose}
    />
  )
}

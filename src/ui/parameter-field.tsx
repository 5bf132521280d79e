import { Select as BaseSelect } from '@base-ui/react/select'
import { useId, useState, type KeyboardEvent } from 'react'
import { FieldError } from './field.tsx'
import { ChoiceList, type Choice } from './select.tsx'

type Common = {
  label: string
  disabled?: boolean
  /** What is wrong with the value as it stands, in a sentence. */
  error?: string | null
}

/**
 * A figure that can be changed in place. Enter commits, Esc restores, leaving the field commits too, so that nothing
 * typed is lost. `check` may refuse a text with a sentence; a refused text stays in the field and is not passed on.
 */
export function ParameterField({
  label,
  unit,
  value,
  onCommit,
  check,
  disabled,
  error,
}: Common & {
  unit?: string
  value: string
  onCommit: (value: string) => void
  check?: (text: string) => string | null
}) {
  const id = useId()
  const [text, setText] = useState(value)
  const [refused, setRefused] = useState<string | null>(null)
  const [seen, setSeen] = useState(value)
  // A new value from outside replaces what stands in the field.
  if (seen !== value) {
    setSeen(value)
    setText(value)
    setRefused(null)
  }

  function commit() {
    const trimmed = text.trim()
    const wrong = check?.(trimmed) ?? null
    setRefused(wrong)
    if (wrong !== null || trimmed === value) return
    // The owner says how the value reads now ("1 ns" may come back as "1"); until then it reads as before.
    setText(value)
    onCommit(trimmed)
  }

  function onKeyDown(event: KeyboardEvent<HTMLInputElement>) {
    if (event.key === 'Enter') {
      event.preventDefault()
      commit()
    }
    if (event.key === 'Escape') {
      // Only this field goes back; a dialog around it must not close as well.
      event.stopPropagation()
      setText(value)
      setRefused(null)
    }
  }

  const wrong = refused ?? error
  return (
    <div className="hs-parameter" data-wrong={wrong ? '' : undefined}>
      <label htmlFor={id}>{label}</label>
      <span className="hs-parameter-value">
        <input
          id={id}
          value={text}
          size={Math.max(2, text.length)}
          disabled={disabled}
          spellCheck={false}
          autoComplete="off"
          aria-invalid={wrong ? true : undefined}
          aria-describedby={`${id}-unit ${id}-error`}
          onChange={(event) => setText(event.target.value)}
          onKeyDown={onKeyDown}
          onBlur={commit}
        />
        {unit && (
          <span className="hs-unit" id={`${id}-unit`}>
            {unit}
          </span>
        )}
      </span>
      <FieldError id={`${id}-error`} words={wrong} />
    </div>
  )
}

/** A parameter chosen from a list; a choice is a commit. */
export function ParameterChoice<Value extends string>({
  label,
  choices,
  value,
  onCommit,
  disabled,
  error,
}: Common & { choices: Choice<Value>[]; value: Value; onCommit: (value: Value) => void }) {
  const id = useId()
  return (
    <div className="hs-parameter hs-parameter-choice" data-wrong={error ? '' : undefined}>
      <span id={id}>{label}</span>
      <BaseSelect.Root
        items={choices}
        value={value}
        disabled={disabled}
        onValueChange={(now) => now !== null && now !== value && onCommit(now as Value)}
      >
        <BaseSelect.Trigger className="hs-parameter-value" aria-labelledby={id}>
          <BaseSelect.Value />
          <span className="hs-caret" aria-hidden />
        </BaseSelect.Trigger>
        <ChoiceList choices={choices} />
      </BaseSelect.Root>
      <FieldError id={`${id}-error`} words={error} />
    </div>
  )
}

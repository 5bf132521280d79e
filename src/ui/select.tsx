import { Select as BaseSelect } from '@base-ui/react/select'
import { useId, type ReactNode } from 'react'
import { classNames } from './class-names.ts'
import { FieldError } from './field.tsx'
import { Icon } from './icon.tsx'

export type Choice<Value extends string> = { value: Value; label: string; note?: string; disabled?: boolean }

type ListProps<Value extends string> = {
  choices: Choice<Value>[]
  value: Value | null
  onChange: (value: Value) => void
  disabled?: boolean
  placeholder?: string
}

/** The open list, drawn by us: the browser's own pop-up is white. Shared with the choice among parameters. */
export function ChoiceList({ choices }: { choices: Choice<string>[] }) {
  return (
    <BaseSelect.Portal>
      <BaseSelect.Positioner className="hs-popup-layer" sideOffset={4} alignItemWithTrigger={false}>
        <BaseSelect.Popup className="hs-popup">
          {choices.map((choice) => (
            <BaseSelect.Item
              key={choice.value}
              value={choice.value}
              disabled={choice.disabled}
              className="hs-popup-item"
            >
              <BaseSelect.ItemIndicator>
                <Icon name="tick" size={14} />
              </BaseSelect.ItemIndicator>
              <span className="hs-popup-words">
                <BaseSelect.ItemText>{choice.label}</BaseSelect.ItemText>
                {choice.note && <small>{choice.note}</small>}
              </span>
            </BaseSelect.Item>
          ))}
        </BaseSelect.Popup>
      </BaseSelect.Positioner>
    </BaseSelect.Portal>
  )
}

/** One of a list, with its label above. */
export function Select<Value extends string>({
  label,
  hint,
  error,
  choices,
  value,
  onChange,
  disabled,
  placeholder = 'Choose',
}: ListProps<Value> & { label: ReactNode; hint?: ReactNode; error?: string | null }) {
  const id = useId()
  return (
    <div className="hs-field">
      <span className="hs-label" id={id}>
        {label}
      </span>
      <BaseSelect.Root
        items={choices}
        value={value}
        disabled={disabled}
        onValueChange={(now) => now !== null && onChange(now as Value)}
      >
        <BaseSelect.Trigger
          className="hs-select"
          aria-labelledby={id}
          aria-invalid={error ? true : undefined}
          aria-describedby={classNames(hint && `${id}-hint`, error && `${id}-error`) || undefined}
        >
          <BaseSelect.Value placeholder={placeholder} />
          <Icon name="caret" size={15} />
        </BaseSelect.Trigger>
        <ChoiceList choices={choices} />
      </BaseSelect.Root>
      {hint && (
        <p className="hs-hint" id={`${id}-hint`}>
          {hint}
        </p>
      )}
      <FieldError id={`${id}-error`} words={error} />
    </div>
  )
}

/** The small form for filters: name and choice in one box. */
export function SelectSlot<Value extends string>({
  name,
  choices,
  value,
  onChange,
  disabled,
}: ListProps<Value> & { name: string }) {
  return (
    <BaseSelect.Root
      items={choices}
      value={value}
      disabled={disabled}
      onValueChange={(now) => now !== null && onChange(now as Value)}
    >
      <BaseSelect.Trigger className="hs-select hs-select-slot" aria-label={name}>
        <span className="hs-select-name">{name}</span>
        <BaseSelect.Value placeholder="any" />
        <Icon name="caret" size={15} />
      </BaseSelect.Trigger>
      <ChoiceList choices={choices} />
    </BaseSelect.Root>
  )
}

import { Checkbox as BaseCheckbox } from '@base-ui/react/checkbox'
import { useId, type ReactNode } from 'react'

/** A real checkbox in our own drawing, with its help text bound to it. */
export function Checkbox({
  label,
  hint,
  checked,
  onChange,
  disabled,
  name,
}: {
  label: ReactNode
  hint?: ReactNode
  checked: boolean
  onChange: (checked: boolean) => void
  disabled?: boolean
  name?: string
}) {
  const id = useId()
  return (
    <div className="hs-check">
      <BaseCheckbox.Root
        className="hs-check-box"
        name={name}
        checked={checked}
        disabled={disabled}
        onCheckedChange={(now) => onChange(now)}
        aria-labelledby={id}
        aria-describedby={hint ? `${id}-hint` : undefined}
      />
      <span>
        <span id={id} onClick={() => !disabled && onChange(!checked)}>
          {label}
        </span>
        {hint && (
          <small className="hs-hint" id={`${id}-hint`}>
            {hint}
          </small>
        )}
      </span>
    </div>
  )
}

import type { ReactNode } from 'react'

export type Option<Value extends string> = { value: Value; label: ReactNode; count?: number }

/** A filter as words on one rule; the current one is an ink block. */
export function OptionRow<Value extends string>({
  label,
  options,
  value,
  onChange,
}: {
  label: string
  options: Option<Value>[]
  value: Value
  onChange: (value: Value) => void
}) {
  return (
    <span className="hs-options" role="group" aria-label={label}>
      {options.map((option) => (
        <button
          type="button"
          key={option.value}
          className="hs-option"
          aria-pressed={option.value === value}
          onClick={() => onChange(option.value)}
        >
          {option.label}
          {option.count !== undefined && <span className="hs-fig">{option.count}</span>}
        </button>
      ))}
    </span>
  )
}

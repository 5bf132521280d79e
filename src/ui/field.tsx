import { useId, useState, type ComponentPropsWithRef, type ReactNode } from 'react'
import { TextButton } from './button.tsx'
import { classNames } from './class-names.ts'
import { Icon } from './icon.tsx'

type Words = {
  label: ReactNode
  /** Help that is always there. */
  hint?: ReactNode
  /** What is wrong, in a sentence; null or absent when nothing is. */
  error?: string | null
}

type Bound = { id: string; 'aria-describedby': string | undefined; 'aria-invalid': true | undefined }

/** Label, control, help and error, bound to each other by id. The control is made by `children` from those bindings. */
export function Field({ label, hint, error, children }: Words & { children: (bound: Bound) => ReactNode }) {
  const id = useId()
  const described = classNames(hint && `${id}-hint`, error && `${id}-error`) || undefined
  return (
    <div className="hs-field">
      <label className="hs-label" htmlFor={id}>
        {label}
      </label>
      {children({ id, 'aria-describedby': described, 'aria-invalid': error ? true : undefined })}
      {hint && (
        <p className="hs-hint" id={`${id}-hint`}>
          {hint}
        </p>
      )}
      <FieldError id={`${id}-error`} words={error} />
    </div>
  )
}

export function FieldError({ id, words }: { id: string; words?: string | null }) {
  return (
    <div role="alert">
      {words && (
        <p className="hs-error" id={id}>
          <Icon name="alert" size={14} />
          <span>{words}</span>
        </p>
      )}
    </div>
  )
}

export function TextField({
  label,
  hint,
  error,
  className,
  ...rest
}: Words & ComponentPropsWithRef<'input'>) {
  return (
    <Field label={label} hint={hint} error={error}>
      {(bound) => <input type="text" {...rest} {...bound} className={classNames('hs-input', className)} />}
    </Field>
  )
}

export function TextArea({
  label,
  hint,
  error,
  className,
  ...rest
}: Words & ComponentPropsWithRef<'textarea'>) {
  return (
    <Field label={label} hint={hint} error={error}>
      {(bound) => <textarea {...rest} {...bound} className={classNames('hs-input', className)} />}
    </Field>
  )
}

/** A passphrase: paste is allowed, it can be shown, and it is neither corrected nor capitalised on the way. */
export function PassphraseField({
  label,
  hint,
  error,
  className,
  ...rest
}: Words & ComponentPropsWithRef<'input'>) {
  const [shown, setShown] = useState(false)
  return (
    <Field label={label} hint={hint} error={error}>
      {(bound) => (
        <div className="hs-input-row">
          <input
            autoComplete="off"
            autoCapitalize="off"
            spellCheck={false}
            {...rest}
            {...bound}
            type={shown ? 'text' : 'password'}
            className={classNames('hs-input', className)}
          />
          <TextButton aria-pressed={shown} onClick={() => setShown(!shown)}>
            {shown ? 'Hide' : 'Show'}
          </TextButton>
        </div>
      )}
    </Field>
  )
}

import { useState } from 'react'
import { TextButton } from '../../ui/button.tsx'
import { ParameterChoice, ParameterField } from '../../ui/parameter-field.tsx'
import type { JsonSchema } from './json-schema.ts'
import { parameterForm, pointerOf, withValue, type ParameterLeaf } from './parameter-fields.ts'
import { AddParameter } from './add-parameter.tsx'
import { textOf, valueOf } from './parameter-text.ts'

interface ParameterRowProps {
  schema: JsonSchema
  parameters: Record<string, unknown>
  /** Locked while it runs, and in a sheet that is not written any more. */
  disabled: boolean
  /** Sentences of the server by pointer. */
  errors: { pointer: string; detail: string }[]
  onChange: (parameters: Record<string, unknown>) => void
}

/** The parameters of a calculation as fields to change in place; the usual ones and those not given behind "More". */
export function ParameterRow({ schema, parameters, disabled, errors, onChange }: ParameterRowProps) {
  const [more, setMore] = useState(false)
  const { given, absent } = parameterForm(schema, parameters)
  const shown = more ? given : given.filter((leaf) => !leaf.usual)
  const hidden = given.length - shown.length + absent.length

  function commit(leaf: ParameterLeaf, text: string) {
    const parsed = valueOf(leaf, text)
    if ('value' in parsed) onChange(withValue(parameters, leaf.path, parsed.value))
  }

  return (
    <div className="hs-parameters">
      {shown.map((leaf) => (
        <LeafField
          key={pointerOf(leaf.path)}
          leaf={leaf}
          disabled={disabled}
          error={errors.find((each) => each.pointer === pointerOf(leaf.path))?.detail ?? null}
          onCommit={(text) => commit(leaf, text)}
          onRemove={
            more && leaf.optional ? () => onChange(withValue(parameters, leaf.path, undefined)) : undefined
          }
        />
      ))}
      {more && !disabled && (
        <AddParameter absent={absent} onAdd={(path, value) => onChange(withValue(parameters, path, value))} />
      )}
      {hidden > 0 && !disabled && (
        <TextButton className="hs-parameters-more" aria-expanded={more} onClick={() => setMore(!more)}>
          {more ? 'Fewer' : 'More'}
        </TextButton>
      )}
    </div>
  )
}

interface LeafFieldProps {
  leaf: ParameterLeaf
  disabled: boolean
  error: string | null
  onCommit: (text: string) => void
  onRemove?: () => void
}

function LeafField({ leaf, disabled, error, onCommit, onRemove }: LeafFieldProps) {
  const { text, unit } = textOf(leaf)
  const common = { label: leaf.label, disabled, error, onCommit }
  return (
    <span className="hs-parameter-slot">
      {leaf.form === 'choice' && (
        <ParameterChoice
          {...common}
          value={text}
          choices={leaf.choices.map((value) => ({ value, label: inWords(value) }))}
        />
      )}
      {leaf.form === 'yes-no' && (
        <ParameterChoice
          {...common}
          value={leaf.value === true ? 'yes' : 'no'}
          choices={[
            { value: 'yes', label: 'yes' },
            { value: 'no', label: 'no' },
          ]}
        />
      )}
      {leaf.form !== 'choice' && leaf.form !== 'yes-no' && (
        <ParameterField {...common} value={text} unit={unit} check={(typed) => refusalOf(leaf, typed)} />
      )}
      {onRemove && !disabled && (
        <TextButton className="hs-parameter-remove" aria-label={`Leave out ${leaf.label}`} onClick={onRemove}>
          Leave out
        </TextButton>
      )}
    </span>
  )
}

/** A name of the interface as words: offPeak and off-peak become "off peak". */
function inWords(name: string): string {
  return name
    .replace(/([a-z])([A-Z])/g, (_, before: string, after: string) => `${before} ${after.toLowerCase()}`)
    .replaceAll('-', ' ')
}

function refusalOf(leaf: ParameterLeaf, typed: string): string | null {
  const parsed = valueOf(leaf, typed)
  return 'refusal' in parsed ? parsed.refusal : null
}

import { conditionSchema, type Condition } from '../../../server/contract/runs.ts'

/** A condition as it is typed: name, value with or without uncertainty, unit. */
export interface ConditionLine {
  name: string
  value: string
  unit: string
}

export const lineOf = ({ name, value, u, unit }: Condition): ConditionLine => ({
  name,
  value: u === null ? value : `${value} ± ${u}`,
  unit: unit ?? '',
})

/** The condition a line means, its decimals as typed; a sentence where it means none. Empty lines are nothing. */
export function conditionFrom(line: ConditionLine): Condition | { refusal: string } | null {
  const name = line.name.trim()
  const typed = line.value.trim()
  if (name === '' && typed === '') return null
  if (name === '') return { refusal: 'Name the condition.' }
  const [value = '', u] = typed
    .split(/±|\+\/?-/)
    .map((part) => part.trim().replace('−', '-').replace(',', '.'))
  const parsed = conditionSchema.safeParse({ name, value, u: u ?? null, unit: line.unit.trim() || null })
  return parsed.success
    ? parsed.data
    : { refusal: `${name}: the value is a number, for example 4.2 or 4.2 ± 0.1.` }
}

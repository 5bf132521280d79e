import { picosecondsIn, suitableUnit, type TimeUnit } from '../../lib/picoseconds.ts'
import type { ParameterLeaf } from './parameter-fields.ts'

export interface ParameterText {
  text: string
  unit: string | undefined
}

/** A value as a person reads it: times in the unit that suits, the rest in their own. */
export function textOf(leaf: ParameterLeaf): ParameterText {
  const { form, value, unit } = leaf
  if (form === 'time' || form === 'whole-time') {
    const shown = suitableUnit(Number(value))
    return { text: shifted(String(value), -exponentOf(shown)), unit: shown }
  }
  if (form === 'quantity') {
    const { value: figure, u } = value as { value: number; u?: number | null }
    return { text: u ? `${figure} ± ${u}` : String(figure), unit }
  }
  if (form === 'integers' && Array.isArray(value)) return { text: value.join(', '), unit }
  if (form === 'json') return { text: typeof value === 'string' ? value : JSON.stringify(value), unit }
  return { text: String(value), unit: unit === '1' ? undefined : unit }
}

export type Parsed = { value: unknown } | { refusal: string }

/** What a typed text means for a field; a refusal is a sentence for the person. */
export function valueOf(leaf: ParameterLeaf, text: string): Parsed {
  switch (leaf.form) {
    case 'time':
    case 'whole-time':
      return timeFrom(leaf, text)
    case 'quantity':
      return quantityFrom(leaf, text)
    case 'integer':
      return /^[-−]?\d+$/.test(text)
        ? { value: Number(text.replace('−', '-')) }
        : { refusal: 'A whole number is needed.' }
    case 'number':
      return isNumber(text) ? { value: Number(plainNumber(text)) } : { refusal: 'A number is needed.' }
    case 'integers':
      return integersFrom(text)
    case 'json':
      return jsonFrom(text)
    case 'choice':
      return { value: text }
    case 'yes-no':
      return { value: text === 'yes' }
  }
}

const plainNumber = (text: string) => text.replace('−', '-').replace(',', '.')
const isNumber = (text: string) => /^[-−]?(\d+([.,]\d*)?|[.,]\d+)(e[-+]?\d+)?$/i.test(text)

/** A time in the unit shown, or in a unit typed after it: "2.5", "500 ps". */
function timeFrom(leaf: ParameterLeaf, text: string): Parsed {
  const [, number = '', typed = ''] = /^(.*?)\s*(ps|ns|µs|us|ms|s)?$/u.exec(text.trim()) ?? []
  if (!isNumber(number)) return { refusal: 'A time is needed, for example 2 ns or 500 ps.' }
  const unit = (typed === 'us' ? 'µs' : typed) || textOf(leaf).unit || 'ps'
  const ps = shifted(plainNumber(number), exponentOf(unit as TimeUnit))
  if (leaf.form === 'time') return { value: Number(ps) }
  if (ps.includes('.')) return { refusal: 'Times are whole picoseconds.' }
  return { value: Number.isSafeInteger(Number(ps)) ? Number(ps) : ps }
}

/** A value with or without uncertainty: "87", "87 ± 4". */
function quantityFrom(leaf: ParameterLeaf, text: string): Parsed {
  const [value = '', u = '0', ...more] = text.split(/±|\+\/?-/).map((part) => part.trim())
  if (!isNumber(value) || !isNumber(u) || more.length > 0)
    return { refusal: 'A value is needed, for example 87 or 87 ± 4.' }
  const known = leaf.value as { unit?: string }
  return {
    value: { value: Number(plainNumber(value)), u: Number(plainNumber(u)), unit: known.unit ?? leaf.unit },
  }
}

function exponentOf(unit: TimeUnit): number {
  return Math.round(Math.log10(picosecondsIn(unit)))
}

/** A decimal times a power of ten, exactly: the point moves, no digit is rounded. */
export function shifted(decimal: string, places: number): string {
  const [mantissa = '', power = '0'] = decimal.toLowerCase().split('e')
  const [whole = '', fraction = ''] = mantissa.replace(/^[-+]/, '').split('.')
  const sign = mantissa.startsWith('-') && /[1-9]/.test(mantissa) ? '-' : ''
  const digits = BigInt(whole + fraction).toString()
  const exponent = Number(power) + places - fraction.length
  if (exponent >= 0) return sign + (digits === '0' ? '0' : digits + '0'.repeat(exponent))
  const padded = digits.padStart(1 - exponent, '0')
  const decimals = padded.slice(exponent).replace(/0+$/, '')
  return sign + padded.slice(0, exponent) + (decimals && `.${decimals}`)
}

function integersFrom(text: string): Parsed {
  const parts = text.split(/[\s,;]+/).filter(Boolean)
  return parts.length > 0 && parts.every((part) => /^-?\d+$/.test(part))
    ? { value: parts.map(Number) }
    : { refusal: 'Whole numbers are needed, with commas between them.' }
}

function jsonFrom(text: string): Parsed {
  try {
    return { value: JSON.parse(text) as unknown }
  } catch {
    return { value: text }
  }
}

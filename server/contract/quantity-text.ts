/*
 * Reported values as text, by the one rounding rule of the record (shapes 1, "Numbers"). Screen, print and signed record
 * use these same functions, so that they show the same characters. Decimals are exact: numbers enter by their shortest
 * JSON text, never by binary arithmetic.
 */

/** (-1)^negative × digits × 10^exponent */
interface Decimal {
  negative: boolean
  digits: bigint
  exponent: number
}

export interface FigureText {
  value: string
  u: string | null
}

/**
 * Texts of a value and its standard uncertainty: u to two significant digits, the value to the same place, half away from
 * zero. Without u (or with u = 0, printed `0`) an integer in full, else six significant digits, zeros at the end cut.
 * Plain when 1e-6 <= max(|value|, u) < 1e9 or value = 0, else both with the exponent of the larger (`2.50e-8`, `0.10e-8`).
 * @throws RangeError when a number is not finite or u is negative.
 */
export function figureText(value: number, u: number | null): FigureText {
  if (!Number.isFinite(value) || (u !== null && !(u >= 0 && Number.isFinite(u)))) {
    throw new RangeError(`A figure needs a finite value and u >= 0, not ${value} ± ${u}.`)
  }
  const exact = decimalOf(value)
  const spread = value !== 0 && !inPlainRange(Math.max(Math.abs(value), u ?? 0))
  if (u === null || u === 0) {
    const rounded = withoutZeros(Number.isInteger(value) ? exact : roundAt(exact, magnitude(exact) - 5))
    return { value: write(rounded, spread ? magnitude(rounded) : 0), u: u === null ? null : '0' }
  }
  const place = placeOfTwoDigits(decimalOf(u))
  const [v, w] = [roundAt(exact, place), roundAt(decimalOf(u), place)]
  const exponent = spread ? magnitude(v.digits > w.digits ? v : w) : 0
  return { value: write(v, exponent), u: write(w, exponent) }
}

function inPlainRange(size: number): boolean {
  return size >= 1e-6 && size < 1e9
}

/** Decimal of the shortest text that reads back as the number. */
function decimalOf(x: number): Decimal {
  const [mantissa = '0', power = '0'] = String(Math.abs(x)).split('e')
  const [whole = '0', fraction = ''] = mantissa.split('.')
  return { negative: x < 0, digits: BigInt(whole + fraction), exponent: Number(power) - fraction.length }
}

/** Power of ten of the first digit; of zero, its last place. */
function magnitude(d: Decimal): number {
  return d.exponent + String(d.digits).length - 1
}

/** Place (power of ten) of the second significant digit of u after rounding: 0.0995 becomes 0.10, not 0.100. */
function placeOfTwoDigits(u: Decimal): number {
  const place = magnitude(u) - 1
  return magnitude(roundAt(u, place)) > magnitude(u) ? place + 1 : place
}

/** Rounded to a multiple of 10^place, half away from zero; the answer's exponent is `place`. */
function roundAt(d: Decimal, place: number): Decimal {
  const shift = place - d.exponent
  if (shift <= 0) return { ...d, digits: d.digits * 10n ** BigInt(-shift), exponent: place }
  const unit = 10n ** BigInt(shift)
  return { ...d, digits: (d.digits + unit / 2n) / unit, exponent: place }
}

function withoutZeros(d: Decimal): Decimal {
  if (d.digits === 0n) return { ...d, exponent: 0 }
  const zeros = /0*$/.exec(String(d.digits))?.[0].length ?? 0
  return { ...d, digits: d.digits / 10n ** BigInt(zeros), exponent: d.exponent + zeros }
}

/** Plain text of d / 10^exponent, then the exponent itself unless 0; no minus on zero. */
function write(d: Decimal, exponent: number): string {
  const decimals = Math.max(0, exponent - d.exponent)
  const padded = String(d.digits) + '0'.repeat(d.digits === 0n ? 0 : Math.max(0, d.exponent - exponent))
  const digits = padded.padStart(decimals + 1, '0')
  const whole = digits.slice(0, digits.length - decimals)
  const text = decimals > 0 ? `${whole}.${digits.slice(-decimals)}` : whole
  return (d.negative && d.digits !== 0n ? '-' : '') + text + (exponent === 0 ? '' : `e${exponent}`)
}

const minus = '\u2212'
const thinSpace = '\u2009'
const raised = '⁰¹²³⁴⁵⁶⁷⁸⁹'

/**
 * The same texts for readers, without unit (`quotes.shown`): U+2212, thin spaces in thousands from five integer digits,
 * `20.00 ± 0.54`, `(2.50 ± 0.10) × 10⁻⁸`, `1.5 × 10¹⁰`.
 */
export function typographic(valueText: string, uText: string | null): string {
  const [value = '', exponent] = valueText.split('e')
  const parts = uText === null ? [value] : [value, uText.split('e')[0] ?? '']
  const numbers = parts.map(typeset).join(' ± ')
  if (exponent === undefined) return numbers
  const power = exponent.replace('-', '⁻').replace(/\d/g, (digit) => raised.charAt(Number(digit)))
  return `${parts.length > 1 ? `(${numbers})` : numbers} × 10${power}`
}

function typeset(number: string): string {
  const [whole = '', ...fraction] = number.replace('-', minus).split('.')
  const long = whole.replace(minus, '').length > 4
  return [long ? whole.replace(/(?<=\d)(?=(\d{3})+$)/g, thinSpace) : whole, ...fraction].join('.')
}

/** `typographic` of a number and its uncertainty. */
export function shownText(value: number, u: number | null): string {
  const text = figureText(value, u)
  return typographic(text.value, text.u)
}

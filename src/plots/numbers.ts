/** A number for an axis: true minus sign, thin spaces in thousands from five digits on. */
export function axisNumber(text: string): string {
  const minus = text.replace(/-/g, '−')
  return minus.replace(/^−?\d{5,}/, (whole) => whole.replace(/(?<=\d)(?=(\d{3})+$)/g, '\u2009'))
}

/** A read-out figure with as many digits as help: `digits` significant ones, no exponent between 1e-4 and 1e7. */
export function readoutNumber(value: number, digits = 4): string {
  if (value === 0) return '0'
  const size = Math.abs(value)
  if (size < 1e-4 || size >= 1e7) return withPower(value, digits)
  const places = Math.max(0, Math.min(10, digits - 1 - Math.floor(Math.log10(size))))
  return axisNumber(value.toFixed(places))
}

/** Value and uncertainty to the same place: the uncertainty to two digits (JCGM 100, 7.2.6). */
export function withUncertainty(value: number, u: number | null): string {
  if (u === null || !(u > 0)) return readoutNumber(value)
  const places = Math.max(0, Math.min(10, 1 - Math.floor(Math.log10(u))))
  return `${axisNumber(value.toFixed(places))} ± ${axisNumber(u.toFixed(places))}`
}

/** "1.5 × 10⁻⁶". */
function withPower(value: number, digits: number): string {
  const [factor = '', power = ''] = value.toExponential(digits - 1).split('e')
  return `${axisNumber(factor)} × ${powerOfTen(Number(power))}`
}

const superscripts = '⁰¹²³⁴⁵⁶⁷⁸⁹'

/** 10 to a whole power, in print: "10⁻⁶". */
export function powerOfTen(power: number): string {
  const digits = [...String(Math.abs(power))].map((digit) => superscripts[Number(digit)]).join('')
  return `10${power < 0 ? '⁻' : ''}${digits}`
}

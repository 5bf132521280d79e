/** digits × 10^-scale, exact. */
export interface Decimal {
  digits: bigint
  scale: number
}

const longestDecimal = 64

/**
 * Reads a decimal exactly: sign, digits, a point (or comma, when asked), an exponent. Null for any other text, for more
 * than 64 characters and for exponents beyond ±400.
 */
export function parseDecimal(text: string, decimalComma = false): Decimal | null {
  if (text.length > longestDecimal) return null
  const plain = decimalComma ? text.replace(',', '.') : text
  const match = /^([+-]?)(\d*)(?:\.(\d*))?(?:[eE]([+-]?\d{1,3}))?$/.exec(plain)
  if (!match) return null
  const [, sign, whole = '', fraction = '', exponent = '0'] = match
  if (whole + fraction === '' || Math.abs(Number(exponent)) > 400) return null
  const digits = BigInt(whole + fraction)
  return { digits: sign === '-' ? -digits : digits, scale: fraction.length - Number(exponent) }
}

const power = (exponent: number) => 10n ** BigInt(exponent)

function floorDivide(a: bigint, b: bigint): bigint {
  const quotient = a / b
  return a % b < 0n ? quotient - 1n : quotient
}

/** floor(y + 1/2) of y = a × b: the rounding of definitions.md B1. */
export function roundedProduct(a: Decimal, b: Decimal): bigint {
  const digits = a.digits * b.digits
  const scale = a.scale + b.scale
  if (scale <= 0) return digits * power(-scale)
  const unit = power(scale)
  return floorDivide(2n * digits + unit, 2n * unit)
}

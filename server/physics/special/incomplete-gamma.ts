import { logGamma, stirlingCorrection, STIRLING_FROM } from './log-gamma.ts'

const MAX_TERMS = 100_000
const TINY = 1e-300

export interface GammaFractions {
  /** Regularised lower incomplete gamma function P(a, x). */
  lower: number
  /** Its complement Q(a, x) = 1 - P(a, x), accurate also where it is tiny. */
  upper: number
}

/**
 * Regularised incomplete gamma functions for a > 0. Power series below x = a + 1, continued fraction above
 * (Abramowitz & Stegun 6.5.29 and 6.5.31), so that the smaller of the two never comes from a difference.
 */
export function incompleteGamma(a: number, x: number): GammaFractions {
  if (x <= 0) return { lower: 0, upper: 1 }
  if (x === Infinity) return { lower: 1, upper: 0 }
  if (x < a + 1) {
    const lower = gammaPrefactor(a, x) * powerSeries(a, x)
    return { lower, upper: 1 - lower }
  }
  const upper = gammaPrefactor(a, x) * continuedFraction(a, x)
  return { lower: 1 - upper, upper }
}

/** x^a exp(-x) / Gamma(a). For large a the exponents nearly cancel, so they are combined before exp is taken. */
export function gammaPrefactor(a: number, x: number): number {
  if (a < STIRLING_FROM) return Math.exp(a * Math.log(x) - x - logGamma(a))
  return Math.sqrt(a / (2 * Math.PI)) * Math.exp(-a * excessOverLog((x - a) / a) - stirlingCorrection(a))
}

/** u - ln(1 + u), by its series near zero where the difference would lose digits. */
function excessOverLog(u: number): number {
  if (Math.abs(u) > 0.1) return u - Math.log1p(u)
  let sum = 0
  let power = u * u
  for (let k = 2; k < 40; k++) {
    const term = (k % 2 === 0 ? power : -power) / k
    sum += term
    if (Math.abs(term) < 1e-17 * Math.abs(sum)) break
    power *= u
  }
  return sum
}

function powerSeries(a: number, x: number): number {
  let term = 1 / a
  let sum = term
  for (let n = 1; n < MAX_TERMS; n++) {
    term *= x / (a + n)
    sum += term
    if (term < sum * 1e-17) break
  }
  return sum
}

/** Modified Lentz evaluation of the fraction for Q(a, x) without its prefactor. */
function continuedFraction(a: number, x: number): number {
  let b = x + 1 - a
  let c = 1 / TINY
  let d = 1 / b
  let value = d
  for (let n = 1; n < MAX_TERMS; n++) {
    const numerator = -n * (n - a)
    b += 2
    d = 1 / nonZero(numerator * d + b)
    c = nonZero(b + numerator / c)
    const factor = d * c
    value *= factor
    if (Math.abs(factor - 1) < 1e-16) break
  }
  return value
}

function nonZero(x: number): number {
  return Math.abs(x) < TINY ? TINY : x
}

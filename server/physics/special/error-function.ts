const TWO_OVER_SQRT_PI = 1.1283791670955126
const SQRT_PI = 1.7724538509055159

/** Below this the series of erf is used; above it 1 - erf would lose digits and the continued fraction is quick. */
const SERIES_UP_TO = 1.5

/** erf(x) = 2/sqrt(pi) exp(-x^2) sum 2^n x^(2n+1)/(2n+1)!! (Abramowitz & Stegun 7.1.6: no cancellation). */
function erfSeries(x: number): number {
  const twice = 2 * x * x
  let term = x
  let sum = x
  for (let n = 1; n < 100; n++) {
    term *= twice / (2 * n + 1)
    sum += term
    if (Math.abs(term) < 1e-17 * Math.abs(sum)) break
  }
  return TWO_OVER_SQRT_PI * Math.exp(-x * x) * sum
}

/** exp(x^2) erfc(x) for x >= SERIES_UP_TO by its continued fraction (Abramowitz & Stegun 7.1.14), innermost first. */
function erfcxFraction(x: number): number {
  if (x > 1e8) return 1 / (x * SQRT_PI)
  let value = x
  for (let n = Math.ceil(12 + 160 / (x * x)); n >= 1; n--) value = x + n / 2 / value
  return 1 / (value * SQRT_PI)
}

/** The error function. */
export function erf(x: number): number {
  if (x < 0) return -erf(-x)
  return x < SERIES_UP_TO ? erfSeries(x) : 1 - Math.exp(-x * x) * erfcxFraction(x)
}

/** The complementary error function 1 - erf(x), accurate where it is tiny. */
export function erfc(x: number): number {
  if (x < SERIES_UP_TO) return x < -SERIES_UP_TO ? 2 - erfc(-x) : 1 - erfSeries(x)
  return Math.exp(-x * x) * erfcxFraction(x)
}

/** The scaled complementary error function exp(x^2) erfc(x), for x >= 0: never overflows or underflows. */
export function erfcx(x: number): number {
  return x < SERIES_UP_TO ? Math.exp(x * x) * (1 - erfSeries(x)) : erfcxFraction(x)
}

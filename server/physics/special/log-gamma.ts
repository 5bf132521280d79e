const HALF_LOG_TWO_PI = 0.9189385332046727

/** B(2n) / (2n (2n - 1)), the coefficients of the Stirling series (Abramowitz & Stegun 6.1.40). */
const STIRLING = [1 / 12, -1 / 360, 1 / 1260, -1 / 1680, 1 / 1188, -691 / 360360, 1 / 156, -3617 / 122400]

/** From here on eight terms of the Stirling series are exact to the last digit of a double. */
export const STIRLING_FROM = 16

/** The correction ln Gamma(a) - [(a - 1/2) ln a - a + ln(2 pi)/2], for a >= STIRLING_FROM. */
export function stirlingCorrection(a: number): number {
  let sum = 0
  let power = 1 / a
  for (const coefficient of STIRLING) {
    sum += coefficient * power
    power /= a * a
  }
  return sum
}

/** ln Gamma(a) for a > 0; small arguments are raised by the recurrence first. */
export function logGamma(a: number): number {
  let shift = 0
  let x = a
  while (x < STIRLING_FROM) {
    shift += Math.log(x)
    x += 1
  }
  return (x - 0.5) * Math.log(x) - x + HALF_LOG_TWO_PI + stirlingCorrection(x) - shift
}

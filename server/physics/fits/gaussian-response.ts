import { erf, erfc, erfcx } from '../special/error-function.ts'

/** Standard deviation of a Gaussian response from its full width at half maximum: FWHM / (2 sqrt(2 ln 2)). */
export const sigmaOfFwhm = (fwhm: number): number => fwhm / (2 * Math.sqrt(2 * Math.LN2))

/**
 * exp(-x/t) for x >= 0, zero before, convolved with a normal distribution of standard deviation sigma (definitions.md B3:
 * the term exp(-x^2/2 sigma^2) is taken inside where erfcx would have a negative argument, so that nothing overflows).
 */
export function oneSidedExponential(x: number, t: number, sigma: number): number {
  if (sigma === 0) return x < 0 ? 0 : Math.exp(-x / t)
  const r = sigma / t
  const y = (r - x / sigma) / Math.SQRT2
  if (y < 0) return 0.5 * Math.exp((r * r) / 2 - x / t) * erfc(y)
  return 0.5 * Math.exp((-x * x) / (2 * sigma * sigma)) * erfcx(y)
}

/** exp(-|x|/t) convolved with the same response. */
export function twoSidedExponential(x: number, t: number, sigma: number): number {
  if (sigma === 0) return Math.exp(-Math.abs(x) / t)
  return oneSidedExponential(x, t, sigma) + oneSidedExponential(-x, t, sigma)
}

/** Share of the response that lies before x; a step at zero convolved with the response. */
function step(x: number, sigma: number): number {
  if (sigma === 0) return x < 0 ? 0 : 1
  return 0.5 * erfc(-x / (sigma * Math.SQRT2))
}

/** Mean of oneSidedExponential over [from, to]. Since h' = -h/t + (response), its integral is t (step - h). */
export function meanOneSided(from: number, to: number, t: number, sigma: number): number {
  const integral = (x: number) => t * (step(x, sigma) - oneSidedExponential(x, t, sigma))
  return (integral(to) - integral(from)) / (to - from)
}

/** Mean of twoSidedExponential over [from, to]. */
export function meanTwoSided(from: number, to: number, t: number, sigma: number): number {
  if (sigma === 0) return meanCusp(from, to, t)
  const integral = (x: number) =>
    t * (erf(x / (sigma * Math.SQRT2)) - oneSidedExponential(x, t, sigma) + oneSidedExponential(-x, t, sigma))
  return (integral(to) - integral(from)) / (to - from)
}

/** Mean of exp(-|x|/t) over [from, to], each side of the cusp by itself; expm1 keeps narrow bins exact. */
function meanCusp(from: number, to: number, t: number): number {
  const side = (near: number, far: number) => -t * Math.exp(-near / t) * Math.expm1(-(far - near) / t)
  if (from >= 0) return side(from, to) / (to - from)
  if (to <= 0) return side(-to, -from) / (to - from)
  return (side(0, to) + side(0, -from)) / (to - from)
}

/** Mean over [from, to] of exp(-x^2/2 s^2) convolved with the response: again a Gaussian, of the same area. */
export function meanGaussian(from: number, to: number, s: number, sigma: number): number {
  const width = Math.hypot(s, sigma) * Math.SQRT2
  return (s * Math.sqrt(Math.PI / 2) * (erf(to / width) - erf(from / width))) / (to - from)
}

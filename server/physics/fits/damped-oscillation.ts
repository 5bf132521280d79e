import { erf } from '../special/error-function.ts'
import { complexErfcx, exponential, minus, over, scaled, times, type Complex } from '../special/faddeeva.ts'

/**
 * Mean over [from, to] of exp(-z |x|), z = decay - i frequency, convolved with a Gaussian response: the forms of
 * gaussian-response.ts with a complex rate.
 */
export function meanOscillation(from: number, to: number, z: Complex, sigma: number): Complex {
  const width = to - from
  if (sigma === 0) {
    const right = minus(tailFrom(Math.max(from, 0), z), tailFrom(Math.max(to, 0), z))
    const left = minus(tailFrom(Math.max(-to, 0), z), tailFrom(Math.max(-from, 0), z))
    return scaled({ re: right.re + left.re, im: right.im + left.im }, 1 / width)
  }
  const integral = (x: number): Complex => {
    const step = { re: erf(x / (sigma * Math.SQRT2)), im: 0 }
    const difference = minus(oneSided(-x, z, sigma), oneSided(x, z, sigma))
    return over({ re: step.re + difference.re, im: difference.im }, z)
  }
  return scaled(minus(integral(to), integral(from)), 1 / width)
}

/** Integral of exp(-z x) from x on. */
const tailFrom = (x: number, z: Complex): Complex => over(exponential(scaled(z, -x)), z)

/** exp(-z x) from x = 0 on, convolved with the response. */
function oneSided(x: number, z: Complex, sigma: number): Complex {
  const y = scaled({ re: sigma * z.re - x / sigma, im: sigma * z.im }, Math.SQRT1_2)
  const bell = Math.exp((-x * x) / (2 * sigma * sigma)) / 2
  if (y.re >= 0) return scaled(complexErfcx(y), bell)
  // erfc(y) = 2 - erfc(-y), with the factor taken inside so that nothing overflows.
  const square = times(z, z)
  const growth = exponential({
    re: (sigma * sigma * square.re) / 2 - z.re * x,
    im: (sigma * sigma * square.im) / 2 - z.im * x,
  })
  return minus(growth, scaled(complexErfcx(scaled(y, -1)), bell))
}

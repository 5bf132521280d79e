import { featureOf, scalesOf } from '../correlation-data.ts'
import { meanOscillation } from '../damped-oscillation.ts'
import { meanTwoSided } from '../gaussian-response.ts'
import { tau0Parameter, type FitModel } from '../model.ts'
import { meanByQuadrature } from '../quadrature.ts'

/**
 * Driven two-level emitter (resonance fluorescence): 1 - (1 - g0) exp(-3 G |x|/4) [cos(m x) + (3 G/4 m) sin(m |x|)] with
 * m = sqrt(Om^2 - G^2/16), where an imaginary m gives cosh and sinh.
 */
export const driven: FitModel = {
  name: 'driven',
  title: 'Driven two-level emitter (resonance fluorescence)',
  parameters: (data) => {
    const scales = scalesOf(data)
    const fastest = 1000 / scales.bin
    const slowest = 1 / (1000 * scales.range)
    const rate = 1 / scales.range
    return [
      { name: 'g0', unit: '1', lower: 0, upper: Infinity, scale: 0.1, physicalBound: 0 },
      { name: 'rabi', unit: 'rad/ps', lower: slowest, upper: fastest, scale: rate },
      { name: 'gamma', unit: '1/ps', lower: slowest, upper: fastest, scale: rate },
      tau0Parameter(scales),
    ]
  },
  mean: (from, to, sigma, [g0, rabi, gamma, tau0]) =>
    1 - (1 - g0!) * meanDip(from - tau0!, to - tau0!, sigma, rabi!, gamma!),
  starts: (data) => {
    const { range } = scalesOf(data)
    const dip = featureOf(data, -1, 3)
    const g0 = 1 - Math.min(Math.max(-dip.height, 0.1), 0.95)
    return [3, 10, 30, 100].flatMap((perRange) =>
      [0.3, 1, 3, 10].map((ratio) => [g0, (ratio * perRange) / range, perRange / range, dip.position]),
    )
  },
  atZero: { parameter: 0, offset: 0, slope: 1 },
}

/** Where |m| is below this share of 3 G/4 the two exponentials nearly coincide and the closed form loses its digits. */
const NEARLY_CRITICAL = 1e-3

/** Mean of the dip over [from, to] with response: as two exponentials, real or a conjugate pair, or by quadrature between. */
function meanDip(from: number, to: number, sigma: number, rabi: number, gamma: number): number {
  const decay = (3 * gamma) / 4
  const square = rabi * rabi - (gamma * gamma) / 16
  const m = Math.sqrt(Math.abs(square))
  if (m < NEARLY_CRITICAL * decay) {
    return meanByQuadrature((x) => drivenDip(x, rabi, gamma), from, to, sigma, 1 / decay)
  }
  if (square > 0) {
    const { re, im } = meanOscillation(from, to, { re: decay, im: -m }, sigma)
    return re + (decay / m) * im
  }
  const slow = meanTwoSided(from, to, 1 / (decay - m), sigma)
  const fast = meanTwoSided(from, to, 1 / (decay + m), sigma)
  return ((1 + decay / m) * slow + (1 - decay / m) * fast) / 2
}

/** exp(-3 G |x|/4) [cos(m x) + (3 G/4 m) sin(m |x|)]: 1 at x = 0. */
export function drivenDip(x: number, rabi: number, gamma: number): number {
  const t = Math.abs(x)
  const decay = (3 * gamma) / 4
  const square = rabi * rabi - (gamma * gamma) / 16
  const m = Math.sqrt(Math.abs(square))
  // Near m = 0 both forms become 1 + decay t; the series avoids 0/0.
  if (m * t < 1e-4)
    return Math.exp(-decay * t) * (1 - (square * t * t) / 2 + decay * t * (1 - (square * t * t) / 6))
  if (square > 0) return Math.exp(-decay * t) * (Math.cos(m * t) + (decay / m) * Math.sin(m * t))
  // cosh and sinh joined to the decay, so that a long delay does not overflow.
  const slow = Math.exp((m - decay) * t)
  const fast = Math.exp((-m - decay) * t)
  return ((1 + decay / m) * slow + (1 - decay / m) * fast) / 2
}

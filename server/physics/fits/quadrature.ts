import { erfc } from '../special/error-function.ts'

interface Rule {
  nodes: number[]
  weights: number[]
}

/** Gauss-Legendre rule of n points on [-1, 1]: roots of the Legendre polynomial by Newton's method. */
export function gaussLegendre(n: number): Rule {
  const nodes: number[] = []
  const weights: number[] = []
  for (let i = 0; i < n; i++) {
    let x = Math.cos((Math.PI * (i + 0.75)) / (n + 0.5))
    let slope = 0
    for (let step = 0; step < 100; step++) {
      let [before, value] = [1, x]
      for (let k = 2; k <= n; k++) [before, value] = [value, ((2 * k - 1) * x * value - (k - 1) * before) / k]
      slope = (n * (x * value - before)) / (x * x - 1)
      const change = value / slope
      x -= change
      if (Math.abs(change) < 1e-16) break
    }
    nodes.push(x)
    weights.push(2 / ((1 - x * x) * slope * slope))
  }
  return { nodes, weights }
}

const RULE = gaussLegendre(20)
/** Beyond seven standard deviations a Gaussian is below the last digit. */
const REACH = 7

/** Integral of f over [from, to] by one twenty-point rule. */
export function integrate(f: (x: number) => number, from: number, to: number): number {
  const half = (to - from) / 2
  const middle = (to + from) / 2
  let sum = 0
  for (let i = 0; i < RULE.nodes.length; i++) sum += RULE.weights[i]! * f(middle + half * RULE.nodes[i]!)
  return sum * half
}

/**
 * Mean over [from, to] of f convolved with a Gaussian response, by quadrature: f weighted with the share of the response
 * that carries each x into the bin. Pieces end at zero, where f may have a cusp, and at the edges of the weight; no
 * piece is longer than `scale`, the length over which f varies.
 */
export function meanByQuadrature(
  f: (x: number) => number,
  from: number,
  to: number,
  sigma: number,
  scale: number,
): number {
  const reach = REACH * sigma
  const weight = (x: number) =>
    sigma === 0 ? 1 : 0.5 * (erfc((x - to) / (sigma * Math.SQRT2)) - erfc((x - from) / (sigma * Math.SQRT2)))
  const marks = [from - reach, from, from + reach, to - reach, to, to + reach, 0]
    .filter((x) => x >= from - reach && x <= to + reach)
    .sort((a, b) => a - b)
  let sum = 0
  for (let i = 1; i < marks.length; i++) {
    const length = marks[i]! - marks[i - 1]!
    const pieces = Math.min(50, Math.ceil(length / scale))
    for (let k = 0; k < pieces; k++) {
      const start = marks[i - 1]! + (length * k) / pieces
      sum += integrate((x) => f(x) * weight(x), start, start + length / pieces)
    }
  }
  return sum / (to - from)
}

/** How far a model is from the data. `deviance` is minimised; Infinity marks model values that are impossible. */
export interface Estimator {
  size: number
  deviance(model: Float64Array): number
  /** Data minus model at i. */
  residual(model: Float64Array, i: number): number
  /** Inverse variance at i under the model. */
  weight(model: Float64Array, i: number): number
}

/**
 * Poisson maximum likelihood: C = 2 sum [m - n + n ln(n/m)] (definitions.md B3). Least squares weighted with 1/n would be
 * low by about one count per bin.
 */
export function poissonEstimator(counts: ArrayLike<number>): Estimator {
  return {
    size: counts.length,
    deviance(model) {
      let sum = 0
      for (let i = 0; i < counts.length; i++) {
        const m = model[i]!
        const n = counts[i]!
        if (!(m > 0) && !(m === 0 && n === 0)) return Infinity
        sum += m - n + (n > 0 ? n * Math.log(n / m) : 0)
      }
      return 2 * sum
    },
    residual: (model, i) => counts[i]! - model[i]!,
    weight: (model, i) => (model[i]! > 0 ? 1 / model[i]! : 0),
  }
}

/** Weighted least squares, C = sum ((y - m)/u)^2, for data that are not counts and carry their own u. */
export function leastSquaresEstimator(values: ArrayLike<number>, u: ArrayLike<number>): Estimator {
  return {
    size: values.length,
    deviance(model) {
      let sum = 0
      for (let i = 0; i < values.length; i++) sum += ((values[i]! - model[i]!) / u[i]!) ** 2
      return Number.isNaN(sum) ? Infinity : sum
    },
    residual: (model, i) => values[i]! - model[i]!,
    weight: (_model, i) => 1 / u[i]! ** 2,
  }
}

/** Pearson's chi2 = sum (n - m)^2/m, or the weighted sum of squares. */
export function chiSquaredOf(estimator: Estimator, model: Float64Array): number {
  let sum = 0
  for (let i = 0; i < estimator.size; i++)
    sum += estimator.residual(model, i) ** 2 * estimator.weight(model, i)
  return sum
}

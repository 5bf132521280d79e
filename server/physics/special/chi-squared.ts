import { gammaPrefactor, incompleteGamma } from './incomplete-gamma.ts'

/**
 * Quantile of the chi-squared distribution: the x below which a share `probability` lies, for `dof` > 0 degrees of
 * freedom. Newton's method inside a bracket, on whichever tail is smaller so that far tails keep their digits.
 */
export function chiSquaredQuantile(probability: number, dof: number): number {
  if (probability <= 0) return 0
  if (probability >= 1) return Infinity
  const a = dof / 2
  const useUpper = probability > 0.5
  const target = useUpper ? 1 - probability : probability
  let low = 0
  let high = a + 40 * Math.sqrt(a) + 800
  let x = a < 1 ? Math.max(a * Math.pow(target, 1 / a), 1e-300) : a
  for (let step = 0; step < 200; step++) {
    const tails = incompleteGamma(a, x)
    const excess = (useUpper ? tails.upper : tails.lower) - target
    if (useUpper === excess > 0) low = x
    else high = x
    const slope = ((useUpper ? -1 : 1) * gammaPrefactor(a, x)) / x
    let next = x - excess / slope
    if (!(next > low && next < high)) next = (low + high) / 2
    const settled = Math.abs(next - x) < 2e-16 * Math.abs(x)
    x = next
    if (settled) break
  }
  return 2 * x
}

/** Two-sided p value of a chi-squared sum: min(1, 2 min(P, Q)). */
export function chiSquaredTwoSided(chi2: number, dof: number): number {
  const { lower, upper } = incompleteGamma(dof / 2, chi2 / 2)
  return Math.min(1, 2 * Math.min(lower, upper))
}

/** Share of the distribution above `chi2`. */
export function chiSquaredUpper(chi2: number, dof: number): number {
  return incompleteGamma(dof / 2, chi2 / 2).upper
}

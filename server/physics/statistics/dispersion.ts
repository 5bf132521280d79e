import { chiSquaredTwoSided } from '../special/chi-squared.ts'

export interface Dispersion {
  /** F = s^2 / mean with the unbiased variance; 1 for counts of constant rate. */
  value: number
  u: number
  chi2: number
  dof: number
  /** Two-sided: min(1, 2 min(P, 1 - P)). */
  p: number
  bins: number
}

/** Index of dispersion of counts in equal time bins (definitions.md B7); null below two bins or without counts. */
export function dispersionOf(counts: ArrayLike<number>): Dispersion | null {
  const bins = counts.length
  if (bins < 2) return null
  let sum = 0
  for (let k = 0; k < bins; k++) sum += counts[k]!
  if (sum === 0) return null
  const mean = sum / bins
  let squares = 0
  for (let k = 0; k < bins; k++) squares += (counts[k]! - mean) ** 2
  const dof = bins - 1
  const value = squares / dof / mean
  const chi2 = dof * value
  return { value, u: value * Math.sqrt(2 / dof), chi2, dof, p: chiSquaredTwoSided(chi2, dof), bins }
}

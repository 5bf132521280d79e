/** Cholesky factor (lower, row by row) of a symmetric matrix; null where it is not positive definite. */
export function choleskyFactor(matrix: number[][]): number[][] | null {
  const n = matrix.length
  const factor = matrix.map((row) => row.map(() => 0))
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = matrix[i]![j]!
      for (let k = 0; k < j; k++) sum -= factor[i]![k]! * factor[j]![k]!
      if (i !== j) factor[i]![j] = sum / factor[j]![j]!
      else if (!(sum > 1e-13 * matrix[i]![i]!)) return null
      else factor[i]![i] = Math.sqrt(sum)
    }
  }
  return factor
}

/** Solves matrix x = vector from the Cholesky factor. */
export function solveWith(factor: number[][], vector: number[]): number[] {
  const n = factor.length
  const x = vector.slice()
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < i; k++) x[i]! -= factor[i]![k]! * x[k]!
    x[i]! /= factor[i]![i]!
  }
  for (let i = n - 1; i >= 0; i--) {
    for (let k = i + 1; k < n; k++) x[i]! -= factor[k]![i]! * x[k]!
    x[i]! /= factor[i]![i]!
  }
  return x
}

/**
 * Inverse of a symmetric positive definite matrix; null where it is singular. Rows and columns are scaled by the diagonal
 * first, so parameters of very different size do no harm.
 */
export function symmetricInverse(matrix: number[][]): number[][] | null {
  const scale = matrix.map((row, i) => 1 / Math.sqrt(row[i]!))
  if (!scale.every(Number.isFinite)) return null
  const factor = choleskyFactor(matrix.map((row, i) => row.map((x, j) => x * scale[i]! * scale[j]!)))
  if (factor === null) return null
  const columns = matrix.map((_, j) =>
    solveWith(
      factor,
      matrix.map((_row, i) => (i === j ? 1 : 0)),
    ),
  )
  return columns.map((column, j) => column.map((x, i) => x * scale[i]! * scale[j]!))
}

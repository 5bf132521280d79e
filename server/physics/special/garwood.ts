import { chiSquaredQuantile } from './chi-squared.ts'
import { erfc } from './error-function.ts'

/** Probability outside one standard deviation of a normal distribution: erfc(1/sqrt 2) = 0.317310507863. */
export const ALPHA_ONE_SIGMA = erfc(Math.SQRT1_2)

/** Upper end of the central 68.27 % interval at zero counts: 1.8410216450. */
export const UPPER_AT_ZERO = garwoodInterval(0)[1]

/** Exact central 68.27 % interval of a Poisson mean when `counts` were seen (Garwood 1936). */
export function garwoodInterval(counts: number): [number, number] {
  const low = counts === 0 ? 0 : chiSquaredQuantile(ALPHA_ONE_SIGMA / 2, 2 * counts) / 2
  return [low, chiSquaredQuantile(1 - ALPHA_ONE_SIGMA / 2, 2 * counts + 2) / 2]
}

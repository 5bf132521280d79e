/** What a coincidence measurement counted, pooled over its inputs. */
export interface PairCounts {
  countsA: number
  countsB: number
  /** T, s. */
  durationS: number
  /** N_c, pairs in the window. */
  pairs: number
  /** A_prod = sum of N_A N_B w (T - |c|)/T^2 over the inputs: pairs expected by chance, as a count. */
  product: number
  /** Sum n_off over the 2 M off-peak windows; null without them. */
  offPeak: { counts: number; windows: number } | null
  /** a = b: pairs are ordered, N_A N_B is N (N - 1). */
  sameChannel: boolean
  /** Zero delay lies inside the window. */
  holdsZero: boolean
  /** The window is centred on zero delay. */
  centred: boolean
  darkA: { value: number; u: number }
  darkB: { value: number; u: number }
  /** u(T)/T of a declared time, common to the whole run; 0 where it is not given. */
  relativeUDuration: number
}

/** N_A N_B, the number of start-stop pairs that there are. */
export function pairProduct(c: PairCounts): number {
  return c.sameChannel ? c.countsA * (c.countsA - 1) : c.countsA * c.countsB
}

/**
 * kappa: two pairs k s apart leave accidentals at +k s and at -k s alike, so mirrored windows are not independent
 * (definitions.md B2).
 */
export function mirrorExcess(c: PairCounts, accidentals: number): number {
  return c.pairs > accidentals ? (c.pairs - accidentals) ** 2 / pairProduct(c) : 0
}

/** A_prod with its u, as counts. */
export function productAccidentals(c: PairCounts): { value: number; u: number } {
  if (c.sameChannel) return { value: c.product, u: (2 * c.product) / Math.sqrt(c.countsA) }
  const shared = (2 * Math.max(0, c.pairs - c.product)) / pairProduct(c)
  return { value: c.product, u: c.product * Math.sqrt(1 / c.countsA + 1 / c.countsB + shared) }
}

/** A_off with its u, as counts in one window; null without off-peak windows. */
export function offPeakAccidentals(c: PairCounts): { value: number; u: number } | null {
  if (c.offPeak === null) return null
  const { counts, windows } = c.offPeak
  const value = counts / windows
  const factor = c.sameChannel && c.centred ? 2 : 1 + mirrorExcess(c, value)
  return { value, u: Math.sqrt(counts * factor) / windows }
}

/**
 * v(A), the variance of N_c/A where A is made of the run's own N_A and N_B: the true pairs lie inside
 * N_c and N_c inside N_A and N_B, so plain quadrature would be wrong (definitions.md B2).
 */
export function ratioVariance(c: PairCounts, accidentals: number): number {
  const plain = c.pairs / accidentals ** 2
  if (c.pairs <= accidentals) return plain
  const excess = c.pairs - accidentals
  const nested = 1 / c.countsA + 1 / c.countsB - (2 * excess) / pairProduct(c)
  const full = plain - (excess / accidentals) ** 2 * nested + mirrorExcess(c, accidentals) / accidentals
  return full > 0 ? full : plain
}

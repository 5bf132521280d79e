import { garwoodInterval } from '../../special/garwood.ts'

export interface G2Bins {
  g2: (number | null)[]
  u: (number | null)[]
  g2Low: (number | null)[]
  g2Up: (number | null)[]
}

/**
 * g2_k = n_k/norm_k with u_k = sqrt(n_k)/norm_k (null at zero counts) and the Garwood interval (definitions.md B3). `pairedBin` is the
 * bin of zero delay in an autocorrelation, whose counts come in twos: -1 where there is none.
 */
export function g2Bins(counts: ArrayLike<number>, norm: ArrayLike<number>, pairedBin: number): G2Bins {
  const bins: G2Bins = { g2: [], u: [], g2Low: [], g2Up: [] }
  const interval = cachedIntervals()
  for (let k = 0; k < counts.length; k++) {
    const n = counts[k]!
    const times = k === pairedBin ? 2 : 1
    const level = norm[k]!
    const exists = level > 0
    const [low, up] = interval(n / times)
    bins.g2.push(exists ? n / level : null)
    bins.u.push(exists && n > 0 ? Math.sqrt(times * n) / level : null)
    bins.g2Low.push(exists ? (times * low) / level : null)
    bins.g2Up.push(exists ? (times * up) / level : null)
  }
  return bins
}

/** Counts repeat from bin to bin, and each interval is a search for a quantile. */
function cachedIntervals(): (n: number) => [number, number] {
  const known = new Map<number, [number, number]>()
  return (n) => {
    const found = known.get(n) ?? garwoodInterval(n)
    known.set(n, found)
    return found
  }
}

/** A correlation histogram as the fits see it. Delays are ps, before tau0 is taken off. */
export interface CorrelationData {
  /** Edges of each bin: lo_k - 1/2 and lo_k + b - 1/2, since a whole picosecond stands for the ps around it. */
  from: Float64Array
  to: Float64Array
  counts: Float64Array
  /** Counts at g2 = 1. */
  norm: Float64Array
}

export const centreOf = (data: CorrelationData, i: number): number => (data.from[i]! + data.to[i]!) / 2
export const widthOf = (data: CorrelationData, i: number): number => data.to[i]! - data.from[i]!

/** Half the range of delays, and a typical bin width: the scales between which a time constant can be seen. */
export function scalesOf(data: CorrelationData): { range: number; bin: number } {
  const last = data.from.length - 1
  const reach = Math.max(Math.abs(centreOf(data, 0)), Math.abs(centreOf(data, last)))
  return { range: reach + widthOf(data, last), bin: widthOf(data, 0) }
}

export interface Feature {
  /** Where g2 departs most from 1, ps. */
  position: number
  /** g2 - 1 there, averaged over `over` bins. */
  height: number
  /** Integral of g2 - 1 over all bins, ps. */
  area: number
}

/** The largest dip (sign -1) or peak (sign 1) of a running mean over `over` bins: where a fit should start. */
export function featureOf(data: CorrelationData, sign: 1 | -1, over: number): Feature {
  const n = data.counts.length
  const width = Math.min(over, n)
  let best = { position: 0, height: -Infinity }
  let counts = 0
  let norm = 0
  let area = 0
  for (let i = 0; i < n; i++) {
    area += (data.counts[i]! / data.norm[i]! - 1) * widthOf(data, i)
    counts += data.counts[i]!
    norm += data.norm[i]!
    if (i >= width) {
      counts -= data.counts[i - width]!
      norm -= data.norm[i - width]!
    }
    if (i < width - 1) continue
    const height = sign * (counts / norm - 1)
    if (height <= best.height) continue
    best = { position: (centreOf(data, i) + centreOf(data, i - width + 1)) / 2, height }
  }
  return { position: best.position, height: sign * best.height, area }
}

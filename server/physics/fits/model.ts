import type { BoundedParameter } from './bounded-fit.ts'
import type { CorrelationData } from './correlation-data.ts'

/** A model of g2 (or of the counts, for a decay) as a function of x = tau - tau0. */
export interface FitModel {
  name: string
  title: string
  /** What its parameters may be, in the order in which they are reported; `tau0` last, where it has one. */
  parameters(data: CorrelationData): BoundedParameter[]
  /** Mean over x in [from, to] of the model convolved with a Gaussian response of standard deviation sigma. */
  mean(from: number, to: number, sigma: number, values: number[]): number
  /** Start values from the data, several: the best is kept. */
  starts(data: CorrelationData): number[][]
  /** The model counts, not multiples of the level of chance. */
  ofCounts?: boolean
  /** g2 at x = 0 without response and bin average, as offset + slope x (parameter of that index). */
  atZero?: { parameter: number | null; offset: number; slope: number }
  /** Values between the bounds that still cannot be, for example t2 <= t1. */
  impossible?(values: number[]): boolean
  /** Full width at half maximum of the spectral line, in Hz, as factor / parameter (ps). */
  linewidth?: { parameter: number; factor: number }
}

/** A time constant: positive, and no shorter or longer than the histogram could ever show. */
export function timeConstant(name: string, { range, bin }: { range: number; bin: number }): BoundedParameter {
  return { name, unit: 'ps', lower: bin / 1000, upper: range * 1000, scale: bin }
}

export function tau0Parameter({ range, bin }: { range: number; bin: number }): BoundedParameter {
  return { name: 'tau0', unit: 'ps', lower: -range, upper: range, scale: bin, isPlace: true }
}

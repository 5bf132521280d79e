import type { Quantity } from '../../../contract/quantity.ts'
import { noQuantity, quantity, zeroCounts } from '../../quantities.ts'
import { UPPER_AT_ZERO } from '../../special/garwood.ts'
import { dispersionOf } from '../../statistics/dispersion.ts'
import type { PulsedResult } from './definition.ts'

export interface PeakArea {
  m: number
  counts: number
}

/** Pairs between the peaks: n_f in 2M windows of `widthPs` each. */
export interface Floor {
  counts: number
  widthPs: number
}

const sidesOf = (peaks: PeakArea[]): PeakArea[] => peaks.filter(({ m }) => m !== 0)
const centralOf = (peaks: PeakArea[]): number => peaks.find(({ m }) => m === 0)!.counts
const meanOf = (peaks: PeakArea[]): number =>
  peaks.reduce((sum, { counts }) => sum + counts, 0) / peaks.length

/** g2(0) = A_0/mean of the side peaks, u = g2(0) sqrt(1/A_0 + 1/sum) (definitions.md B5). */
export function centralOverSide(peaks: PeakArea[]): Quantity {
  const sides = sidesOf(peaks)
  const mean = meanOf(sides)
  const central = centralOf(peaks)
  if (mean === 0) return noQuantity('1')
  if (central === 0) return zeroCounts(1 / mean, '1')
  const value = central / mean
  return quantity(value, value * Math.sqrt(1 / central + 1 / (mean * sides.length)), '1')
}

/** The same with the floor of dark counts taken out of every peak. */
export function withoutFloor(peaks: PeakArea[], floor: Floor, peakWindowPs: number): Quantity {
  const sides = sidesOf(peaks)
  const mean = meanOf(sides)
  const central = centralOf(peaks)
  const perPs = floor.counts / (sides.length * floor.widthPs)
  const signal = mean - perPs * peakWindowPs
  if (signal <= 0) return noQuantity('1')
  const value = (central - perPs * peakWindowPs) / signal
  // f0^2/n_f, written so that it holds for n_f = 0.
  const floorVariance = perPs / (sides.length * floor.widthPs)
  const variance =
    central + (value ** 2 * mean) / sides.length + (1 - value) ** 2 * peakWindowPs ** 2 * floorVariance
  if (central === 0)
    return quantity(value, null, '1', { upper: (UPPER_AT_ZERO - perPs * peakWindowPs) / signal })
  return quantity(value, Math.sqrt(variance) / signal, '1')
}

/** Scatter of the side peaks against Poisson, and their slope against |m|: blinking shows as a decay. */
export function sideScatterOf(peaks: PeakArea[]): PulsedResult['sideScatter'] {
  const sides = sidesOf(peaks)
  const mean = meanOf(sides)
  const dispersion = dispersionOf(sides.map(({ counts }) => counts))
  return {
    ...quantity(dispersion?.value ?? null, dispersion?.u ?? null, '1'),
    p: dispersion?.p ?? null,
    chi2: dispersion?.chi2 ?? null,
    dof: sides.length - 1,
    mean,
    slope: slopeOf(sides, mean),
  }
}

/** Relative slope a period by least squares, u from Poisson counts. */
function slopeOf(sides: PeakArea[], mean: number): Quantity {
  const middle = sides.reduce((sum, { m }) => sum + Math.abs(m), 0) / sides.length
  let spread = 0
  let product = 0
  for (const { m, counts } of sides) {
    spread += (Math.abs(m) - middle) ** 2
    product += (Math.abs(m) - middle) * counts
  }
  if (spread === 0 || mean === 0) return noQuantity('1')
  return quantity(product / spread / mean, Math.sqrt(mean / spread) / mean, '1')
}

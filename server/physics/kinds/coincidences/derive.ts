import type { Quantity } from '../../../contract/quantity.ts'
import { inQuadrature, noQuantity, quantity, zeroCounts } from '../../quantities.ts'
import {
  mirrorExcess,
  offPeakAccidentals,
  productAccidentals,
  ratioVariance,
  type PairCounts,
} from './pair-statistics.ts'

export interface DerivedCoincidences {
  rate: Quantity
  accidentals: { product: Quantity; offPeak: Quantity | null }
  trueRate: Quantity
  car: Quantity
  rawCar: Quantity
  g2: Quantity
  klyshko: { a: Quantity; b: Quantity }
}

/** All figures of a coincidence measurement from its counts (definitions.md B2). `used` names the accidentals to subtract. */
export function deriveCoincidences(c: PairCounts, used: 'offPeak' | 'product'): DerivedCoincidences {
  const product = productAccidentals(c)
  const offPeak = offPeakAccidentals(c)
  const subtracted = used === 'offPeak' ? offPeak! : product
  // A_prod is made of this run's own counts, so its scatter is inside N_c already.
  const ownU = used === 'offPeak' ? subtracted.u : 0
  const car = c.sameChannel ? noQuantity('1') : carOf(c, used)
  return {
    rate: rateOf(c),
    accidentals: { product: productRate(c, product), offPeak: offPeak && offPeakRate(c, offPeak) },
    trueRate: c.sameChannel ? noQuantity('cps') : trueRateOf(c, subtracted.value, ownU),
    car,
    rawCar: car.value === null ? car : { ...car, value: car.value + 1 },
    g2: g2Of(c),
    klyshko: {
      a: c.sameChannel ? noQuantity('1') : efficiency(c, subtracted.value, ownU, c.countsB, c.darkB),
      b: c.sameChannel ? noQuantity('1') : efficiency(c, subtracted.value, ownU, c.countsA, c.darkA),
    },
  }
}

/** Ordered pairs of one channel come in twos when the window holds zero. */
const doubled = (c: PairCounts): number => (c.sameChannel && c.holdsZero ? 2 : 1)

function rateOf(c: PairCounts): Quantity {
  if (c.pairs === 0) return zeroCounts(doubled(c) / c.durationS, 'cps')
  const rate = c.pairs / c.durationS
  const u = Math.sqrt(doubled(c) * c.pairs) / c.durationS
  return quantity(rate, inQuadrature(u, rate * c.relativeUDuration), 'cps')
}

function productRate(c: PairCounts, product: { value: number; u: number }): Quantity {
  const rate = product.value / c.durationS
  if (product.value === 0) return quantity(0, null, 'cps')
  return quantity(rate, inQuadrature(product.u / c.durationS, 2 * rate * c.relativeUDuration), 'cps')
}

function offPeakRate(c: PairCounts, offPeak: { value: number; u: number }): Quantity {
  if (offPeak.value === 0) {
    const both = c.sameChannel && c.centred ? 2 : 1
    return zeroCounts(both / (c.offPeak!.windows * c.durationS), 'cps')
  }
  const rate = offPeak.value / c.durationS
  return quantity(rate, inQuadrature(offPeak.u / c.durationS, rate * c.relativeUDuration), 'cps')
}

function trueRateOf(c: PairCounts, accidentals: number, ownU: number): Quantity {
  const rate = (c.pairs - accidentals) / c.durationS
  const u = Math.sqrt(c.pairs + mirrorExcess(c, accidentals) * accidentals + ownU ** 2) / c.durationS
  return quantity(rate, inQuadrature(u, rate * c.relativeUDuration), 'cps')
}

/** Coincidences-to-accidentals ratio, N_c/A - 1. */
function carOf(c: PairCounts, used: 'offPeak' | 'product'): Quantity {
  const accidentals = used === 'offPeak' ? offPeakAccidentals(c)!.value : c.product
  if (accidentals === 0) return noQuantity('1')
  if (c.pairs === 0) return quantity(-1, null, '1')
  const ratio = c.pairs / accidentals
  const variance = ratioVariance(c, accidentals)
  if (used === 'product')
    return quantity(ratio - 1, inQuadrature(Math.sqrt(variance), ratio * c.relativeUDuration), '1')
  const fromOffPeak = (ratio ** 2 * (1 + mirrorExcess(c, accidentals))) / c.offPeak!.counts
  return quantity(ratio - 1, Math.sqrt(variance + fromOffPeak), '1')
}

function g2Of(c: PairCounts): Quantity {
  if (c.product === 0) return noQuantity('1')
  if (c.pairs === 0) return zeroCounts(doubled(c) / c.product, '1')
  const value = c.pairs / c.product
  const twice = c.sameChannel && c.holdsZero
  const u = twice ? Math.sqrt(2 * c.pairs) / c.product : Math.sqrt(ratioVariance(c, c.product))
  return quantity(value, inQuadrature(u, value * c.relativeUDuration), '1')
}

/** Klyshko efficiency of the arm opposite to the one with `counts` singles and dark rate `dark`. */
function efficiency(
  c: PairCounts,
  accidentals: number,
  ownU: number,
  counts: number,
  dark: { value: number; u: number },
): Quantity {
  const signal = counts - dark.value * c.durationS
  const truePairs = c.pairs - accidentals
  const eta = truePairs / signal
  const darkU = inQuadrature(c.durationS * dark.u, dark.value * c.durationS * c.relativeUDuration)
  const bracket =
    truePairs * (1 - 2 * eta) +
    accidentals * (1 + mirrorExcess(c, accidentals)) +
    ownU ** 2 +
    eta ** 2 * counts +
    (eta * darkU) ** 2
  if (signal <= 0 || bracket < 0) return noQuantity('1')
  return quantity(eta, Math.sqrt(bracket) / signal, '1')
}

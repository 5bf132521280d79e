import type { Quantity } from '../contract/quantity.ts'
import { UPPER_AT_ZERO } from './special/garwood.ts'

export const PS_PER_S = 1e12

/** A quantity for a result; what is not finite does not exist and becomes null. */
export function quantity(
  value: number | null,
  u: number | null,
  unit: string,
  limits: { upper?: number; lower?: number } = {},
): Quantity {
  return { value: finite(value), u: value === null ? null : finite(u), unit, ...limits }
}

export const noQuantity = (unit: string): Quantity => quantity(null, null, unit)

/** Nothing was counted: value 0, no u, and the upper end of the central 68.27 % interval times `perCount`. */
export function zeroCounts(perCount: number, unit: string): Quantity {
  return quantity(0, null, unit, { upper: UPPER_AT_ZERO * perCount })
}

export function finite(x: number | null): number | null {
  return x !== null && Number.isFinite(x) ? x : null
}

/** Root of a sum of squares. */
export const inQuadrature = (...terms: number[]): number =>
  Math.sqrt(terms.reduce((sum, t) => sum + t * t, 0))

/** Picoseconds for JSON: a number up to 2^53, text of digits beyond. */
export function picosecondsJson(ps: bigint): number | string {
  return ps >= -MAX_EXACT && ps <= MAX_EXACT ? Number(ps) : ps.toString()
}

const MAX_EXACT = 2n ** 53n

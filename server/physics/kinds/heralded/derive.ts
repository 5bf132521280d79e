import type { Quantity } from '../../../contract/quantity.ts'
import { noQuantity, quantity, zeroCounts } from '../../quantities.ts'
import { UPPER_AT_ZERO } from '../../special/garwood.ts'

export interface HeraldCounts {
  heralds: number
  heraldsWithA: number
  heraldsWithB: number
  heraldsWithBoth: number
}

/**
 * g2 = N_HAB N_H/(N_HA N_HB). The counts are nested, so relative u^2 = 1/N_HAB - 1/N_HA - 1/N_HB + (2 g2 - 1)/N_H; where every arm
 * fires that is negative and there is no u (definitions.md B6).
 */
export function heraldedG2(c: HeraldCounts): Quantity {
  const singles = c.heraldsWithA * c.heraldsWithB
  if (singles === 0) return noQuantity('1')
  if (c.heraldsWithBoth === 0) return zeroCounts(c.heralds / singles, '1')
  const value = (c.heraldsWithBoth * c.heralds) / singles
  const relative =
    1 / c.heraldsWithBoth - 1 / c.heraldsWithA - 1 / c.heraldsWithB + (2 * value - 1) / c.heralds
  return quantity(value, relative < 0 ? null : value * Math.sqrt(relative), '1')
}

/** Share of heralds that an arm answers, with its binomial u; limits at 0 and 1. */
export function heraldingEfficiency(answered: number, heralds: number): Quantity {
  if (heralds === 0) return noQuantity('1')
  if (answered === 0) return zeroCounts(1 / heralds, '1')
  if (answered === heralds) return quantity(1, null, '1', { lower: 1 - UPPER_AT_ZERO / heralds })
  const share = answered / heralds
  return quantity(share, Math.sqrt((share * (1 - share)) / heralds), '1')
}

import type { Quantity } from '../../../contract/quantity.ts'
import { inQuadrature, quantity } from '../../quantities.ts'
import { refuse } from '../../refuse.ts'
import type { BackgroundParameter } from './definition.ts'

/** q = rho_A rho_B, and the relative u of q that all bins share. */
export interface SignalShare {
  q: number
  relativeU: number
}

/** Counts and time from which background rates become signal fractions. */
export interface RatesSeen {
  countsA: number
  countsB: number
  durationS: number
}

/** The signal share of a background parameter (definitions.md B3). */
export function signalShare(background: BackgroundParameter, seen: RatesSeen): SignalShare {
  if ('rho' in background)
    return { q: background.rho ** 2, relativeU: (2 * background.uRho) / background.rho }
  const [a, b] =
    'rateA' in background
      ? [
          fraction(background.rateA, seen.countsA, seen.durationS, 'rateA'),
          fraction(background.rateB, seen.countsB, seen.durationS, 'rateB'),
        ]
      : [
          { rho: background.rhoA, u: background.uRhoA },
          { rho: background.rhoB, u: background.uRhoB },
        ]
  return { q: a.rho * b.rho, relativeU: inQuadrature(a.u / a.rho, b.u / b.rho) }
}

/** rho = 1 - rate/R with u^2 = (u(rate)/R)^2 + (rate/R^2)^2 N/T^2. */
function fraction(
  rate: { value: number; u: number | null },
  counts: number,
  durationS: number,
  field: string,
): { rho: number; u: number } {
  const total = counts / durationS
  const rho = 1 - rate.value / total
  if (!(rho > 0 && rho <= 1)) {
    refuse(
      `/parameters/background/${field}`,
      `A background of ${rate.value} cps leaves no signal in the ${total.toPrecision(4)} cps of this channel. Give a rate from 0 to below the channel's own.`,
    )
  }
  return {
    rho,
    u: inQuadrature((rate.u ?? 0) / total, (rate.value / total ** 2) * (Math.sqrt(counts) / durationS)),
  }
}

/** g_c = 1 - (1 - g)/q (Brouri et al., Opt. Lett. 25, 1294 (2000), for unequal fractions). */
export const withoutBackground = (g: number, { q }: SignalShare): number => 1 - (1 - g) / q

/** The corrected quantity; the common u of the fractions enters here and not in the bins. */
export function correctedQuantity(raw: Quantity, share: SignalShare): Quantity {
  if (raw.value === null) return quantity(null, null, '1')
  const value = withoutBackground(raw.value, share)
  const u = raw.u === null ? null : inQuadrature(raw.u / share.q, (1 - value) * share.relativeU)
  return quantity(
    value,
    u,
    '1',
    raw.upper === undefined ? {} : { upper: withoutBackground(raw.upper, share) },
  )
}

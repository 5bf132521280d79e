import { PS_PER_S } from '../quantities.ts'
import { smallestRootOfYExpMinusY } from '../special/lambert-w.ts'

export interface DeadTime {
  ps: number
  uPs: number
  kind: 'non-extending' | 'extending'
}

export interface CorrectedRate {
  /** Rate that would be seen without dead time, cps. */
  rate: number
  u: number
}

/** Largest R tau_d that a dead time of this kind can give: 1, or 1/e where every tag restarts it. */
export function deadTimeLimit(kind: DeadTime['kind']): number {
  return kind === 'extending' ? Math.exp(-1) : 1
}

/**
 * Rate without dead time from N counts in T seconds: R/(1 - R tau_d), or the smallest root of R = R0 exp(-R0 tau_d). Dead time
 * narrows the count distribution, var N = N (1 - R tau_d)^2 or N (1 - 2 R tau_d), which u takes into account
 * (physics.md section 1). `rate tau_d` must lie below deadTimeLimit.
 */
export function correctDeadTime(counts: number, durationS: number, deadTime: DeadTime): CorrectedRate {
  const tau = deadTime.ps / PS_PER_S
  const uTau = deadTime.uPs / PS_PER_S
  const rate = counts / durationS
  const share = rate * tau
  if (deadTime.kind === 'non-extending') {
    const corrected = rate / (1 - share)
    return {
      rate: corrected,
      u: Math.hypot(Math.sqrt(counts) / (durationS * (1 - share)), corrected ** 2 * uTau),
    }
  }
  const y = smallestRootOfYExpMinusY(share)
  const corrected = tau === 0 ? rate : y / tau
  const fromCounts = ((Math.sqrt(counts * (1 - 2 * share)) / durationS) * Math.exp(y)) / (1 - y)
  return { rate: corrected, u: Math.hypot(fromCounts, (corrected ** 2 * uTau) / (1 - y)) }
}

import type { Quantity } from '../../contract/quantity.ts'
import { quantity } from '../quantities.ts'
import type { BoundedOutcome, BoundedParameter } from './bounded-fit.ts'
import type { CorrelationData } from './correlation-data.ts'
import type { FitModelName } from './models/index.ts'

export interface FitRequest {
  model: FitModelName
  /** Start values by name, in place of those from the data. */
  start?: Record<string, number> | undefined
  /** Full width at half maximum of the timing response of the pair, ps. */
  responseFwhmPs?: number | undefined
  /** Zero delay, where it is known; free otherwise. */
  tau0Ps?: number | undefined
  level: 'fixed' | 'free'
}

export interface FitResult {
  model: FitModelName
  converged: boolean
  /** Why it did not converge; null where it did. */
  reason: string | null
  parameters: Record<string, Quantity>
  g2Zero?: Quantity
  g2ZeroCorrected?: Quantity
  linewidth?: Quantity
  chi2: number | null
  dof: number
  /** Share of the chi2 distribution above chi2; null below five counts a bin, where the distribution does not hold. */
  pValue: number | null
  deviance: number | null
  responseFwhmPs: number
  level: 'fixed' | 'free'
  atBound: string[]
  /** Where an unfinished fit stood; empty where it converged. */
  stoppedAt: Record<string, number>
  covariance: { parameters: string[]; matrix: number[][] }
  /** Fitted g2 (counts for a decay) in each bin, averaged over it and the response, and its u. */
  values: (number | null)[]
  valuesU: (number | null)[]
  /** (n - m)/sqrt(m) of each fitted bin; null for bins that were not fitted. */
  residuals: (number | null)[]
}

/** Bins that are fitted, all bins that are drawn, and which of the latter is the first fitted one. */
export interface FitData {
  fitted: CorrelationData
  all: CorrelationData
  firstFitted: number
}

const REASONS: Record<NonNullable<BoundedOutcome['failure']>, string> = {
  bound: 'bound',
  singular: 'the data do not determine all parameters',
  iterations: 'no minimum was reached',
  'impossible-start': 'the model is not possible at any of the start values',
}

/** A fit without a result, and why there is none. */
export function emptyFit(
  request: FitRequest,
  parameters: BoundedParameter[],
  data: FitData,
  reason: string,
): FitResult {
  const none = new Array<null>(data.all.counts.length).fill(null)
  return {
    model: request.model,
    converged: false,
    reason,
    parameters: Object.fromEntries(parameters.map((p) => [p.name, quantity(null, null, p.unit)])),
    chi2: null,
    dof: data.fitted.counts.length - parameters.filter((p) => p.fixed !== true).length,
    pValue: null,
    deviance: null,
    responseFwhmPs: request.responseFwhmPs ?? 0,
    level: request.level,
    atBound: [],
    stoppedAt: {},
    covariance: { parameters: [], matrix: [] },
    values: none,
    valuesU: none,
    residuals: none,
  }
}

/** Parameters of a fit that did not converge are no result: they stay empty, and where it stopped is told apart. */
export function unconverged(
  request: FitRequest,
  parameters: BoundedParameter[],
  data: FitData,
  outcome: BoundedOutcome,
): FitResult {
  return {
    ...emptyFit(request, parameters, data, REASONS[outcome.failure!]),
    stoppedAt: Object.fromEntries(parameters.map((p, j) => [p.name, outcome.values[j]!])),
  }
}

import {
  minimise,
  type FitFailure,
  type FitOutcome,
  type FitParameter,
  type FitProblem,
} from './levenberg-marquardt.ts'

export interface BoundedParameter extends FitParameter {
  unit: string
  /** The bound that nature sets (g0 = 0, c = 1, beta = 0): a value there is an answer, quoted as a limit. */
  physicalBound?: number
}

export interface BoundedOutcome {
  values: number[]
  u: (number | null)[]
  /** For a parameter at its physical bound: where the profiled deviance has risen by 1. */
  limits: (number | null)[]
  /** Names of the parameters that ended on a physical bound. */
  atBound: string[]
  free: number[]
  covariance: number[][]
  deviance: number
  model: Float64Array
  failure: FitFailure | 'bound' | null
  iterations: number
}

/** Starts that are followed to the end; the others lose on their first deviance. */
const STARTS_FOLLOWED = 4
const BLIND = 1000
const AT_PHYSICAL_BOUND = 1e-6
const AT_OTHER_BOUND = 1e-9

/**
 * Best fit over several starts, with the rule for bounds of definitions.md B3: a parameter on a physical bound is fixed
 * there, the rest fitted again, and its limit quoted; on any other bound the fit has failed.
 */
export function fitWithBounds(
  problem: Omit<FitProblem, 'start' | 'parameters'> & { parameters: BoundedParameter[] },
  starts: number[][],
): BoundedOutcome {
  const best = bestOf(problem, starts)
  const held = problem.parameters.map((p, j) => p.fixed !== true && isAt(best.values[j]!, p.physicalBound))
  const stuck = problem.parameters.some((p, j) => p.fixed !== true && !held[j] && isStuck(best.values[j]!, p))
  if (best.failure !== null) return unfinished(best, best.failure)
  if (stuck) return unfinished(best, 'bound')
  if (isBlind(problem.parameters, best)) return unfinished(best, 'singular')
  if (!held.includes(true)) return finished(problem.parameters, best, held, [])
  const values = best.values.map((x, j) => (held[j] ? problem.parameters[j]!.physicalBound! : x))
  const parameters = problem.parameters.map((p, j) => (held[j] ? { ...p, fixed: true } : p))
  const refit = minimise({ ...problem, parameters, start: values })
  if (refit.failure !== null) return unfinished(refit, refit.failure)
  const limits = problem.parameters.map((_, j) => (held[j] ? profileLimit(problem, refit, j) : null))
  return finished(problem.parameters, refit, held, limits)
}

function bestOf(problem: Omit<FitProblem, 'start'>, starts: number[][]): FitOutcome {
  const model = new Float64Array(problem.estimator.size)
  const screened = starts
    .map((start) => {
      problem.model(start, model)
      return { start, deviance: problem.estimator.deviance(model) }
    })
    .sort((a, b) => a.deviance - b.deviance)
  const outcomes = screened.slice(0, STARTS_FOLLOWED).map(({ start }) => minimise({ ...problem, start }))
  const settled = outcomes.filter((o) => o.failure === null)
  return (settled.length > 0 ? settled : outcomes).reduce((a, b) => (b.deviance < a.deviance ? b : a))
}

const isAt = (value: number, bound: number | undefined): boolean =>
  bound !== undefined && Math.abs(value - bound) <= AT_PHYSICAL_BOUND

function isStuck(value: number, { lower, upper }: FitParameter): boolean {
  const near = (bound: number) =>
    Number.isFinite(bound) && Math.abs(value - bound) <= AT_OTHER_BOUND * Math.max(1, Math.abs(bound))
  return near(lower) || near(upper)
}

/** A positive parameter with a u far beyond its size is not determined, whatever the matrix says. */
function isBlind(parameters: BoundedParameter[], outcome: FitOutcome): boolean {
  return outcome.free.some((j, row) => {
    const u = Math.sqrt(outcome.covariance[row]![row]!)
    return parameters[j]!.lower > 0 && u > BLIND * Math.abs(outcome.values[j]!)
  })
}

/** Value of parameter j, away from its bound, at which the deviance of the best fit of all others has risen by 1. */
function profileLimit(
  problem: Omit<FitProblem, 'start' | 'parameters'> & { parameters: BoundedParameter[] },
  atBound: FitOutcome,
  j: number,
): number | null {
  const parameter = problem.parameters[j]!
  const bound = parameter.physicalBound!
  const inward = bound === parameter.lower ? 1 : -1
  const parameters = problem.parameters.map((p, k) => (k === j ? { ...p, fixed: true } : p))
  let start = atBound.values
  const rise = (distance: number): number => {
    const outcome = minimise({ ...problem, parameters, start: start.with(j, bound + inward * distance) })
    if (outcome.failure === null) start = outcome.values
    return outcome.deviance - atBound.deviance - 1
  }
  let low = 0
  let high = parameter.scale / 100
  for (let step = 0; step < 60 && rise(high) < 0; step++) [low, high] = [high, high * 2]
  for (let step = 0; step < 60 && high - low > 1e-7 * high; step++) {
    const middle = (low + high) / 2
    if (rise(middle) < 0) low = middle
    else high = middle
  }
  return Number.isFinite(high) ? bound + inward * high : null
}

function finished(
  parameters: BoundedParameter[],
  outcome: FitOutcome,
  held: boolean[],
  limits: (number | null)[],
): BoundedOutcome {
  const u = parameters.map((_, j) => {
    const row = outcome.free.indexOf(j)
    return row < 0 ? null : Math.sqrt(outcome.covariance[row]![row]!)
  })
  return {
    ...outcome,
    u,
    limits: parameters.map((_, j) => limits[j] ?? null),
    atBound: parameters.filter((_, j) => held[j]).map((p) => p.name),
  }
}

function unfinished(outcome: FitOutcome, failure: FitFailure | 'bound'): BoundedOutcome {
  const nothing = outcome.values.map(() => null)
  return { ...outcome, u: nothing, limits: nothing, atBound: [], free: [], covariance: [], failure }
}

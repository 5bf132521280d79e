import type { Estimator } from './estimators.ts'
import { choleskyFactor, solveWith, symmetricInverse } from './linear-algebra.ts'

export interface FitParameter {
  name: string
  lower: number
  upper: number
  /** Typical size where the value itself may be zero; sets the step of numerical derivatives. */
  scale: number
  /** A place on the axis: its size says nothing about the step of derivatives, which must stay far below a bin. */
  isPlace?: boolean
  /** Held at its start value. */
  fixed?: boolean
}

export interface FitProblem {
  parameters: FitParameter[]
  start: number[]
  estimator: Estimator
  /** Writes the model at each datum. */
  model(values: number[], out: Float64Array): void
}

export type FitFailure = 'iterations' | 'singular' | 'impossible-start'

export interface FitOutcome {
  values: number[]
  deviance: number
  model: Float64Array
  /** Indices of the parameters that were free at the end. */
  free: number[]
  /** Inverse of sum (dm/dp)(dm/dp)/variance over the free parameters, in their order; not scaled by chi2. */
  covariance: number[][]
  failure: FitFailure | null
  iterations: number
}

const MOST_ITERATIONS = 300
/** Converged when a full step would lower the deviance by less than this: a millionth of a standard deviation. */
const TOLERANCE = 1e-12
/** What is accepted when rounding stops any further descent. */
const LOOSE_TOLERANCE = 1e-6
const LARGEST_DAMPING = 1e14
const SMALLEST_DAMPING = 1e-12
/** A positive parameter changes by at most this factor in one step. */
const LARGEST_FACTOR = 5
const DERIVATIVE_STEP = 1e-4

/**
 * Levenberg-Marquardt descent of the deviance with Fisher's expected curvature and box bounds (a parameter that is pushed
 * against its bound rests there until the gradient points inside again).
 * Method: Marquardt, J. SIAM 11, 431 (1963; from memory); weights 1/m make its fixed point the maximum of the Poisson likelihood.
 */
export function minimise(problem: FitProblem): FitOutcome {
  const { estimator, parameters } = problem
  let values = problem.start.map((x, j) => clamp(x, parameters[j]!))
  let model = evaluate(problem, values)
  let deviance = estimator.deviance(model)
  let damping = 1e-3
  if (!Number.isFinite(deviance)) return failed(values, deviance, model, 'impossible-start', 0)
  for (let iteration = 1; iteration <= MOST_ITERATIONS; iteration++) {
    const jacobian = derivatives(problem, values)
    const { gradient, curvature } = normalEquations(estimator, model, jacobian)
    const free = freeParameters(parameters, values, gradient)
    const inverse = free.length === 0 ? [] : symmetricInverse(submatrix(curvature, free))
    const decrement =
      inverse === null
        ? Infinity
        : quadraticForm(
            inverse,
            free.map((j) => gradient[j]!),
          )
    if (inverse !== null && decrement < TOLERANCE) {
      return { values, deviance, model, free, covariance: inverse, failure: null, iterations: iteration }
    }
    let moved = false
    for (let growth = 2; !moved && damping < LARGEST_DAMPING; growth *= 2) {
      const next = dampedStep(problem, values, gradient, curvature, free, damping)
      const nextModel = next && evaluate(problem, next)
      const nextDeviance = nextModel === null ? Infinity : estimator.deviance(nextModel)
      if (next !== null && nextDeviance <= deviance && next.some((x, j) => x !== values[j])) {
        const step = next.map((x, j) => x - values[j]!)
        const promised = 2 * dot(gradient, step) - quadraticForm(curvature, step)
        damping = Math.max(damping * dampingFactor((deviance - nextDeviance) / promised), SMALLEST_DAMPING)
        values = next
        model = nextModel!
        deviance = nextDeviance
        moved = true
      } else damping *= growth
    }
    if (moved) continue
    if (inverse !== null && decrement < LOOSE_TOLERANCE) {
      return { values, deviance, model, free, covariance: inverse, failure: null, iterations: iteration }
    }
    return failed(values, deviance, model, inverse === null ? 'singular' : 'iterations', iteration)
  }
  return failed(values, deviance, model, 'iterations', MOST_ITERATIONS)
}

/** How the damping follows the share of the promised descent that was found (Nielsen, IMM-REP-1999-05, DTU 1999; from memory). */
function dampingFactor(gain: number): number {
  return Number.isFinite(gain) ? Math.min(Math.max(1 / 3, 1 - (2 * gain - 1) ** 3), 2) : 2
}

const dot = (a: number[], b: number[]): number => a.reduce((sum, x, j) => sum + x * b[j]!, 0)

function failed(
  values: number[],
  deviance: number,
  model: Float64Array,
  failure: FitFailure,
  iterations: number,
): FitOutcome {
  return { values, deviance, model, free: [], covariance: [], failure, iterations }
}

function clamp(x: number, { lower, upper, fixed }: FitParameter): number {
  return fixed === true ? x : Math.min(Math.max(x, lower), upper)
}

function evaluate(problem: FitProblem, values: number[]): Float64Array {
  const out = new Float64Array(problem.estimator.size)
  problem.model(values, out)
  return out
}

/** dm/dp by central differences; null rows for fixed parameters. */
export function derivatives(problem: Omit<FitProblem, 'start'>, values: number[]): (Float64Array | null)[] {
  const size = problem.estimator.size
  return problem.parameters.map(({ fixed, scale, isPlace }, j) => {
    if (fixed === true) return null
    const step = DERIVATIVE_STEP * (isPlace === true ? scale / 10 : Math.max(Math.abs(values[j]!), scale))
    const above = new Float64Array(size)
    const below = new Float64Array(size)
    problem.model(values.with(j, values[j]! + step), above)
    problem.model(values.with(j, values[j]! - step), below)
    return above.map((m, i) => (m - below[i]!) / (2 * step))
  })
}

/** Half the negative gradient of the deviance, and its expected curvature; zero for fixed parameters. */
function normalEquations(estimator: Estimator, model: Float64Array, jacobian: (Float64Array | null)[]) {
  const n = jacobian.length
  const gradient = new Array<number>(n).fill(0)
  const curvature = Array.from({ length: n }, () => new Array<number>(n).fill(0))
  for (let j = 0; j < n; j++) {
    const dj = jacobian[j]
    if (!dj) continue
    for (let i = 0; i < estimator.size; i++) {
      gradient[j]! += dj[i]! * estimator.residual(model, i) * estimator.weight(model, i)
    }
    for (let k = 0; k <= j; k++) {
      const dk = jacobian[k]
      if (!dk) continue
      let sum = 0
      for (let i = 0; i < estimator.size; i++) sum += dj[i]! * dk[i]! * estimator.weight(model, i)
      curvature[j]![k] = sum
      curvature[k]![j] = sum
    }
  }
  return { gradient, curvature }
}

function freeParameters(parameters: FitParameter[], values: number[], gradient: number[]): number[] {
  const free: number[] = []
  parameters.forEach(({ lower, upper, fixed }, j) => {
    const held = (values[j]! <= lower && gradient[j]! < 0) || (values[j]! >= upper && gradient[j]! > 0)
    if (fixed !== true && !held) free.push(j)
  })
  return free
}

/** Values after one damped step inside the bounds; null where the damped equations cannot be solved. */
function dampedStep(
  { parameters }: FitProblem,
  values: number[],
  gradient: number[],
  curvature: number[][],
  free: number[],
  damping: number,
): number[] | null {
  const scale = free.map((j) => 1 / Math.sqrt(curvature[j]![j]! || 1))
  const scaled = free.map((j, r) =>
    free.map((k, c) => curvature[j]![k]! * scale[r]! * scale[c]! + (r === c ? damping : 0)),
  )
  const factor = choleskyFactor(scaled)
  if (factor === null) return null
  const step = solveWith(
    factor,
    free.map((j, r) => gradient[j]! * scale[r]!),
  )
  const next = values.slice()
  free.forEach((j, r) => {
    const before = values[j]!
    let after = before + step[r]! * scale[r]!
    if (parameters[j]!.lower > 0)
      after = Math.min(Math.max(after, before / LARGEST_FACTOR), before * LARGEST_FACTOR)
    next[j] = clamp(after, parameters[j]!)
  })
  return next
}

const submatrix = (matrix: number[][], indices: number[]): number[][] =>
  indices.map((j) => indices.map((k) => matrix[j]![k]!))

export function quadraticForm(matrix: number[][], vector: number[]): number {
  let sum = 0
  for (let j = 0; j < vector.length; j++) {
    for (let k = 0; k < vector.length; k++) sum += vector[j]! * matrix[j]![k]! * vector[k]!
  }
  return sum
}

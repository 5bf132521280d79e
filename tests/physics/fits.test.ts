import { describe, expect, it } from 'vitest'
import { fitCorrelation } from '../../server/physics/fits/fit-correlation.ts'
import type { FitRequest } from '../../server/physics/fits/fit-result.ts'
import { leastSquaresEstimator, poissonEstimator } from '../../server/physics/fits/estimators.ts'
import { minimise } from '../../server/physics/fits/levenberg-marquardt.ts'
import { fitModels } from '../../server/physics/fits/models/index.ts'
import type { CorrelationData } from '../../server/physics/fits/correlation-data.ts'
import type { FitModel } from '../../server/physics/fits/model.ts'
import { sigmaOfFwhm } from '../../server/physics/fits/gaussian-response.ts'
import { closeTo } from './close-to.ts'
import { poisson, seeded } from './seeded.ts'

/** A histogram of bins b over +-K b with Poisson counts about a known model. */
function simulated(
  model: FitModel,
  values: number[],
  options: { b: number; K: number; level: number; fwhm?: number; seed: number },
): CorrelationData {
  const { b, K, level, fwhm = 0, seed } = options
  const random = seeded(seed)
  const n = 2 * K + 1
  const from = Float64Array.from({ length: n }, (_, i) => (i - K) * b - Math.floor(b / 2) - 0.5)
  const to = from.map((x) => x + b)
  const norm = new Float64Array(n).fill(level)
  const factor = model.ofCounts ? 1 : level
  const counts = from.map((x, i) =>
    poisson(random, factor * model.mean(x, to[i]!, sigmaOfFwhm(fwhm), values)),
  )
  return { from, to, counts, norm }
}

const fit = (data: CorrelationData, request: Omit<FitRequest, 'level'> & { level?: 'free' | 'fixed' }) =>
  fitCorrelation({ fitted: data, all: data, firstFitted: 0 }, { level: 'fixed', ...request })

describe('fits recover simulated truth', () => {
  it.each([
    ['two-level', [0.15, 8000, 300], { b: 500, K: 100, level: 200, fwhm: 1500 }],
    ['three-level', [0.85, 0.6, 4000, 60000, -200], { b: 500, K: 300, level: 300, fwhm: 600 }],
    ['driven', [0.05, 0.002, 0.0003, 100], { b: 200, K: 100, level: 300, fwhm: 400 }],
    ['chaotic-lorentzian', [0.8, 2e6, -4e4], { b: 1e5, K: 80, level: 500 }],
    ['chaotic-gaussian', [0.5, 3e6, 2e5], { b: 1e5, K: 80, level: 500, fwhm: 1e6 }],
    ['decay', [400, 9000, 12, 3000], { b: 250, K: 200, level: 1, fwhm: 700 }],
  ] as const)('%s', (name, values, options) => {
    const data = simulated(fitModels[name], [...values], { ...options, seed: 11 })
    const found = fit(data, { model: name, responseFwhmPs: 'fwhm' in options ? options.fwhm : undefined })
    expect(found.converged).toBe(true)
    Object.entries(found.parameters).forEach(([parameter, q], j) => {
      expect(
        Math.abs(q.value! - values[j]!) / q.u!,
        `${parameter} ${q.value} ± ${q.u}, truth ${values[j]}`,
      ).toBeLessThan(4)
    })
    expect(Math.abs(found.chi2! - found.dof)).toBeLessThan(4 * Math.sqrt(2 * found.dof))
  })

  it('u of t1 is the scatter of t1 over repeated simulations', () => {
    const runs = Array.from({ length: 60 }, (_, i) => {
      const data = simulated(fitModels['two-level'], [0.2, 8000, 0], {
        b: 1000,
        K: 40,
        level: 150,
        seed: 100 + i,
      })
      const { t1 } = fit(data, { model: 'two-level' }).parameters
      return { value: t1!.value!, u: t1!.u! }
    })
    const mean = runs.reduce((sum, r) => sum + r.value, 0) / runs.length
    const scatter = Math.sqrt(runs.reduce((sum, r) => sum + (r.value - mean) ** 2, 0) / (runs.length - 1))
    const told = runs.reduce((sum, r) => sum + r.u, 0) / runs.length
    // 60 runs know a standard deviation to 9 %.
    expect(Math.abs(scatter / told - 1)).toBeLessThan(0.3)
    expect(Math.abs(mean - 8000)).toBeLessThan((4 * told) / Math.sqrt(60))
  })

  it('a free level takes up bunching beyond the range', () => {
    const data = simulated(fitModels['two-level'], [0.1, 8000, 0], { b: 500, K: 100, level: 260, seed: 3 })
    data.norm.fill(200)
    const { parameters } = fit(data, { model: 'two-level', level: 'free' })
    expect(Object.keys(parameters)).toEqual(['g0', 't1', 'tau0', 'level'])
    expect(Math.abs(parameters.level!.value! - 1.3)).toBeLessThan(4 * parameters.level!.u!)
  })

  it('Poisson likelihood of constant counts is their mean, u sqrt(mean/n): closed form', () => {
    const counts = [3, 0, 5, 2, 4, 1, 7, 2]
    const outcome = minimise({
      parameters: [{ name: 'm', lower: 0, upper: Infinity, scale: 1 }],
      start: [1],
      estimator: poissonEstimator(counts),
      model: ([m], out) => void out.fill(m!),
    })
    closeTo(outcome.values[0], 3, 1e-7)
    closeTo(Math.sqrt(outcome.covariance[0]![0]!), Math.sqrt(3 / 8), 1e-7)
    closeTo(outcome.deviance, 2 * counts.reduce((s, n) => s + (n > 0 ? n * Math.log(n / 3) : 0), 0), 1e-9)
  })

  it('weighted least squares of a mean: closed form', () => {
    const outcome = minimise({
      parameters: [{ name: 'm', lower: -Infinity, upper: Infinity, scale: 1 }],
      start: [0],
      estimator: leastSquaresEstimator([0.1, 0.12, 0.09], [0.01, 0.02, 0.01]),
      model: ([m], out) => void out.fill(m!),
    })
    // definitions.md check 45: mean, u_int, chi2.
    closeTo(outcome.values[0], 0.0977777777778, 1e-10)
    closeTo(Math.sqrt(outcome.covariance[0]![0]!), 0.00666666666667, 1e-9)
    closeTo(outcome.deviance, 1.88888888889, 1e-10)
  })
})

describe('bounds and honest failure (definitions.md B3)', () => {
  it('g0 on its physical bound is fixed, quoted as an upper limit, and the rest is fitted', () => {
    const data = simulated(fitModels['two-level'], [0, 8000, 0], { b: 500, K: 100, level: 100, seed: 5 })
    data.counts.fill(0, 98, 103)
    const found = fit(data, { model: 'two-level' })
    expect(found.converged).toBe(true)
    expect(found.atBound).toEqual(['g0'])
    const { g0, t1 } = found.parameters
    expect(g0).toMatchObject({ value: 0, u: null })
    expect(g0!.upper).toBeGreaterThan(0)
    expect(t1!.u).toBeGreaterThan(0)
    expect(found.g2Zero).toEqual({ value: 0, u: null, unit: '1', upper: g0!.upper })
    // At the limit the profiled deviance has risen by 1: fit again with a start that is held by a g0 of that value.
    const held = minimise({
      parameters: fitModels['two-level']
        .parameters(data)
        .map((p) => (p.name === 'g0' ? { ...p, fixed: true } : p)),
      start: [g0!.upper!, t1!.value!, 0],
      estimator: poissonEstimator(data.counts),
      model: (values, out) =>
        out.forEach(
          (_, i) =>
            (out[i] = data.norm[i]! * fitModels['two-level'].mean(data.from[i]!, data.to[i]!, 0, values)),
        ),
    })
    closeTo(held.deviance - found.deviance!, 1, 1e-5)
  })

  it('c = 1 gives a lower limit, and an upper limit of g2(0)', () => {
    const data = simulated(fitModels['three-level'], [1, 0.5, 4000, 50000, 0], {
      b: 500,
      K: 300,
      level: 200,
      seed: 8,
    })
    data.counts.fill(0, 298, 303)
    const found = fit(data, { model: 'three-level' })
    expect(found.atBound).toEqual(['c'])
    expect(found.parameters.c!.lower).toBeLessThan(1)
    closeTo(found.g2Zero!.upper, 1 - found.parameters.c!.lower!, 1e-12)
  })

  it('light without a dip determines no lifetime: not converged, no parameter reported', () => {
    const data = simulated(fitModels.coherent, [], { b: 500, K: 60, level: 50, seed: 2 })
    // Counts at the very level of chance.
    data.counts.fill(50)
    const found = fit(data, { model: 'two-level' })
    expect(found.converged).toBe(false)
    expect(found.reason).not.toBeNull()
    expect(Object.values(found.parameters).every((q) => q.value === null)).toBe(true)
    expect(found).not.toHaveProperty('g2Zero')
    expect(Object.keys(found.stoppedAt)).toEqual(['g0', 't1', 'tau0'])
  })

  it('too few bins for the parameters is said so', () => {
    const data = simulated(fitModels['two-level'], [0, 8000, 0], { b: 500, K: 0, level: 100, seed: 5 })
    expect(fit(data, { model: 'three-level' })).toMatchObject({
      converged: false,
      reason: 'fewer bins than free parameters',
    })
  })

  it('a chi2 p value is quoted only from five counts a bin on', () => {
    const few = simulated(fitModels.coherent, [], { b: 500, K: 60, level: 3, seed: 2 })
    const many = simulated(fitModels.coherent, [], { b: 500, K: 60, level: 30, seed: 2 })
    expect(fit(few, { model: 'coherent' }).pValue).toBeNull()
    expect(fit(many, { model: 'coherent' }).pValue).toBeGreaterThan(1e-4)
  })

  it('a given zero delay is held', () => {
    const data = simulated(fitModels['two-level'], [0.1, 8000, 700], { b: 500, K: 100, level: 200, seed: 4 })
    const { parameters } = fit(data, { model: 'two-level', tau0Ps: 700 })
    expect(parameters.tau0).toEqual({ value: 700, u: null, unit: 'ps' })
  })
})

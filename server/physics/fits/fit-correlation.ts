import type { Quantity } from '../../contract/quantity.ts'
import { quantity } from '../quantities.ts'
import { refuse } from '../refuse.ts'
import { chiSquaredUpper } from '../special/chi-squared.ts'
import { fitWithBounds, type BoundedOutcome, type BoundedParameter } from './bounded-fit.ts'
import type { CorrelationData } from './correlation-data.ts'
import { chiSquaredOf, poissonEstimator } from './estimators.ts'
import { sigmaOfFwhm } from './gaussian-response.ts'
import { derivatives, quadraticForm } from './levenberg-marquardt.ts'
import type { FitModel } from './model.ts'
import { emptyFit, unconverged, type FitData, type FitRequest, type FitResult } from './fit-result.ts'
import { fitModels } from './models/index.ts'

/** Fits a model to a correlation histogram by Poisson maximum likelihood (definitions.md B3, Fit). */
export function fitCorrelation(data: FitData, request: FitRequest): FitResult {
  const model: FitModel = fitModels[request.model]
  const parameters = parametersOf(model, data.fitted, request)
  const sigma = sigmaOfFwhm(request.responseFwhmPs ?? 0)
  const estimator = poissonEstimator(data.fitted.counts)
  const problem = { parameters, estimator, model: modelCounts(model, data.fitted, sigma, request.level) }
  const free = parameters.filter((p) => p.fixed !== true).length
  const dof = data.fitted.counts.length - free
  if (dof < 0) return emptyFit(request, parameters, data, 'fewer bins than free parameters')
  const outcome = fitWithBounds(problem, startsOf(model, data.fitted, parameters, request))
  if (outcome.failure !== null) return unconverged(request, parameters, data, outcome)
  return converged(model, request, parameters, data, sigma, outcome)
}

function parametersOf(
  model: FitModel,
  data: CorrelationData,
  { tau0Ps, level }: FitRequest,
): BoundedParameter[] {
  const own = model
    .parameters(data)
    .map((p): BoundedParameter => (p.name === 'tau0' && tau0Ps !== undefined ? { ...p, fixed: true } : p))
  return level === 'fixed'
    ? own
    : [...own, { name: 'level', unit: '1', lower: 1e-6, upper: Infinity, scale: 0.1 }]
}

function startsOf(
  model: FitModel,
  data: CorrelationData,
  parameters: BoundedParameter[],
  { start = {}, tau0Ps, level }: FitRequest,
): number[][] {
  const given = tau0Ps === undefined ? start : { ...start, tau0: tau0Ps }
  const unknown = Object.keys(start).find((name) => parameters.every((p) => p.name !== name))
  if (unknown !== undefined) {
    const names = parameters.map((p) => p.name).join(', ') || 'none'
    refuse(
      `/parameters/fit/start/${unknown}`,
      `The model ${model.name} has no parameter "${unknown}". It has ${names}.`,
    )
  }
  return model
    .starts(data)
    .map((values) => (level === 'fixed' ? values : [...values, 1]))
    .map((values) => values.map((x, j) => given[parameters[j]!.name] ?? x))
}

/** Model counts m_k: the norm of the bin times the averaged model; a decay is in counts already. */
function modelCounts(model: FitModel, data: CorrelationData, sigma: number, level: FitRequest['level']) {
  return (values: number[], out: Float64Array): void => {
    if (model.impossible?.(values) === true) {
      out.fill(NaN)
      return
    }
    const factor = level === 'free' ? values[values.length - 1]! : 1
    for (let i = 0; i < out.length; i++) {
      const norm = model.ofCounts === true ? 1 : data.norm[i]!
      out[i] = factor * norm * model.mean(data.from[i]!, data.to[i]!, sigma, values)
    }
  }
}

function converged(
  model: FitModel,
  request: FitRequest,
  parameters: BoundedParameter[],
  data: FitData,
  sigma: number,
  outcome: BoundedOutcome,
): FitResult {
  const { fitted, all, firstFitted } = data
  const estimator = poissonEstimator(fitted.counts)
  const chi2 = chiSquaredOf(estimator, outcome.model)
  const dof = fitted.counts.length - outcome.free.length
  const enough = outcome.model.every((m) => m >= 5)
  const quantities = parameters.map((p, j) => parameterQuantity(p, outcome, j))
  const { values, u } = curveOf(model, request.level, parameters, all, sigma, outcome)
  const residuals = Array.from(outcome.model, (m, i) =>
    m > 0 ? (fitted.counts[i]! - m) / Math.sqrt(m) : null,
  )
  return {
    model: request.model,
    converged: true,
    reason: null,
    parameters: Object.fromEntries(parameters.map((p, j) => [p.name, quantities[j]!])),
    ...(model.atZero ? { g2Zero: g2AtZero(model.atZero, quantities) } : {}),
    ...(model.linewidth ? { linewidth: linewidthOf(model.linewidth, quantities) } : {}),
    chi2,
    dof,
    pValue: enough && dof > 0 ? chiSquaredUpper(chi2, dof) : null,
    deviance: outcome.deviance,
    responseFwhmPs: request.responseFwhmPs ?? 0,
    level: request.level,
    atBound: outcome.atBound,
    stoppedAt: {},
    covariance: { parameters: outcome.free.map((j) => parameters[j]!.name), matrix: outcome.covariance },
    values,
    valuesU: u,
    residuals: [...new Array<null>(firstFitted).fill(null), ...residuals],
  }
}

function parameterQuantity(parameter: BoundedParameter, outcome: BoundedOutcome, j: number): Quantity {
  const limit = outcome.limits[j] ?? null
  const isLower = parameter.physicalBound === parameter.lower
  const limits = limit === null ? {} : isLower ? { upper: limit } : { lower: limit }
  return quantity(outcome.values[j]!, outcome.u[j]!, parameter.unit, limits)
}

/** The fitted model at x = 0, without response and bin average. */
function g2AtZero(
  { parameter, offset, slope }: NonNullable<FitModel['atZero']>,
  quantities: Quantity[],
): Quantity {
  if (parameter === null) return quantity(offset, null, '1')
  const { value, u, upper, lower } = quantities[parameter]!
  const limit = upper ?? lower
  return quantity(
    offset + slope * value!,
    u,
    '1',
    limit === undefined ? {} : { upper: offset + slope * limit },
  )
}

function linewidthOf(
  { parameter, factor }: NonNullable<FitModel['linewidth']>,
  quantities: Quantity[],
): Quantity {
  const { value, u } = quantities[parameter]!
  return quantity(factor / value!, u === null ? null : (factor / value!) * (u / value!), 'Hz')
}

/** The model in every drawn bin and its u from the covariance, both as g2 (counts for a decay). */
function curveOf(
  model: FitModel,
  level: FitRequest['level'],
  parameters: BoundedParameter[],
  all: CorrelationData,
  sigma: number,
  outcome: BoundedOutcome,
): { values: number[]; u: number[] } {
  const ones = { ...all, norm: all.norm.map(() => 1) }
  const evaluate = modelCounts(model, ones, sigma, level)
  const values = new Float64Array(all.counts.length)
  evaluate(outcome.values, values)
  const jacobian = derivatives(
    { parameters, estimator: poissonEstimator(all.counts), model: evaluate },
    outcome.values,
  )
  const u = Array.from(values, (_, i) =>
    Math.sqrt(
      Math.max(
        0,
        quadraticForm(
          outcome.covariance,
          outcome.free.map((j) => jacobian[j]![i]!),
        ),
      ),
    ),
  )
  return { values: Array.from(values), u }
}

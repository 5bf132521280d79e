import type { Figure, FigurePanel, FigureSeries } from '../../../contract/figure.ts'
import {
  countBar,
  domainAbove,
  inWords,
  SYMMETRIC_FROM,
  timeUnit,
  type FigureTable,
} from '../../figure-data.ts'
import { fitModels } from '../../fits/models/index.ts'
import type { FitModel } from '../../fits/model.ts'
import type { CorrelationResult } from './definition.ts'

const RESIDUAL_CLIP = 4

type Fit = NonNullable<CorrelationResult['fit']>

/** g2 against delay with its error bars, the fit over its 2 sigma band, and the residuals below. */
export function figure(result: CorrelationResult): Figure | null {
  if (result.g2.every((g) => g === null)) return null
  const fit = result.fit?.converged === true ? result.fit : null
  const ofCounts = fit !== null && (fitModels[fit.model] as FitModel).ofCounts === true
  const delays = result.delaysPs.map(Number)
  const reach = Math.abs(delays[0]!) + Number(result.binPs) / 2
  const unit = timeUnit(reach)
  const x = delays.map((d) => d / unit.ps)
  const main = ofCounts ? countsPanel(result, x, fit) : g2Panel(result, x, fit)
  return {
    title: 'Correlation',
    description: describe(result, fit),
    x: {
      label: 'delay',
      symbol: 'τ',
      unit: unit.name,
      scale: 'linear',
      domain: [-reach / unit.ps, reach / unit.ps],
    },
    panels: fit === null ? [main] : [main, residualPanel(x, fit)],
    table: tableOf(result, fit),
  }
}

function describe(result: CorrelationResult, fit: Fit | null): string {
  const zero = `g2(0) of the bin of ${result.binPs} ps is ${inWords(result.g2Zero)}`
  if (fit === null) {
    const failed = result.fit === null ? '' : ` The ${result.fit.model} fit did not converge.`
    return `Second-order correlation against delay: ${zero}.${failed}`
  }
  const parameters = Object.entries(fit.parameters)
    .filter(([, q]) => q.value !== null)
    .map(([name, q]) => `${name} = ${inWords(q)}${q.unit === '1' ? '' : ` ${q.unit}`}`)
  return `Second-order correlation against delay with ${fit.model} fit: ${[zero, ...parameters].join(', ')}.`
}

function g2Panel(result: CorrelationResult, x: number[], fit: Fit | null): FigurePanel {
  const low = result.g2.map((g, k) => (symmetric(result, k) ? g! - result.u[k]! : result.g2Low[k]!))
  const high = result.g2.map((g, k) => (symmetric(result, k) ? g! + result.u[k]! : result.g2Up[k]!))
  const points: FigureSeries = {
    label: 'g2',
    mark: 'points',
    role: 'coincidence',
    x,
    y: result.g2,
    low,
    high,
  }
  const antibunched = fit !== null && (fit.g2Zero?.value ?? 1) < 1
  return {
    y: {
      label: '',
      symbol: 'g²(τ)',
      unit: '1',
      scale: 'linear',
      domain: domainAbove(0, result.g2, high, [1]),
    },
    weight: 5,
    series: [...curveOf(x, fit), points],
    references: [
      { axis: 'y', at: 1, label: 'coherent light', style: 'dashed' },
      ...(antibunched
        ? [{ axis: 'y' as const, at: 0.5, label: 'one emitter below', style: 'short-dashed' as const }]
        : []),
      { axis: 'x', at: 0, label: '', style: 'dotted' },
    ],
    ground: null,
  }
}

const symmetric = (result: CorrelationResult, k: number): boolean =>
  result.counts[k]! >= SYMMETRIC_FROM && result.g2[k] !== null && result.u[k] !== null

/** A decay is a curve of counts. */
function countsPanel(result: CorrelationResult, x: number[], fit: Fit | null): FigurePanel {
  const bars = result.counts.map(countBar)
  const low = bars.map(([end]) => end)
  const high = bars.map(([, end]) => end)
  return {
    y: { label: 'counts in a bin', symbol: 'n', unit: '1', scale: 'linear', domain: domainAbove(0, high) },
    weight: 5,
    series: [
      ...curveOf(x, fit),
      { label: 'counts', mark: 'points', role: 'coincidence', x, y: result.counts, low, high },
    ],
    references: [{ axis: 'x', at: 0, label: '', style: 'dotted' }],
    ground: null,
  }
}

function curveOf(x: number[], fit: Fit | null): FigureSeries[] {
  if (fit === null) return []
  const away = (sign: number) =>
    fit.values.map((v, k) => (v === null ? null : v + sign * 2 * (fit.valuesU[k] ?? 0)))
  return [
    {
      label: '2 sigma of the fit',
      mark: 'band',
      role: 'fit',
      x,
      y: fit.values,
      low: away(-1),
      high: away(1),
    },
    { label: `${fit.model} fit`, mark: 'line', role: 'fit', x, y: fit.values, low: null, high: null },
  ]
}

function residualPanel(x: number[], fit: Fit): FigurePanel {
  return {
    y: {
      label: 'residual',
      symbol: null,
      unit: 'σ',
      scale: 'linear',
      domain: [-RESIDUAL_CLIP, RESIDUAL_CLIP],
    },
    weight: 1,
    series: [
      { label: 'residuals', mark: 'stems', role: 'coincidence', x, y: fit.residuals, low: null, high: null },
    ],
    references: [],
    ground: [-2, 2],
  }
}

function tableOf(result: CorrelationResult, fit: Fit | null): FigureTable {
  const columns = [
    { name: 'delay', unit: 'ps' },
    { name: 'counts', unit: '1' },
    { name: 'g2', unit: '1' },
    { name: 'u(g2)', unit: '1' },
    { name: 'g2 low', unit: '1' },
    { name: 'g2 up', unit: '1' },
    ...(result.g2Corrected ? [{ name: 'g2 corrected', unit: '1' }] : []),
    ...(fit
      ? [
          { name: 'fit', unit: '1' },
          { name: 'u(fit)', unit: '1' },
          { name: 'residual', unit: 'σ' },
        ]
      : []),
  ]
  const rows = result.delaysPs.map((delay, k) => [
    delay,
    result.counts[k]!,
    result.g2[k]!,
    result.u[k]!,
    result.g2Low[k]!,
    result.g2Up[k]!,
    ...(result.g2Corrected ? [result.g2Corrected[k]!] : []),
    ...(fit ? [fit.values[k]!, fit.valuesU[k]!, fit.residuals[k]!] : []),
  ])
  return { columns, rows }
}

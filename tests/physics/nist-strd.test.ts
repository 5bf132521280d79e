import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { leastSquaresEstimator } from '../../server/physics/fits/estimators.ts'
import { minimise } from '../../server/physics/fits/levenberg-marquardt.ts'
import { referencePath } from '../support/reference.ts'
import { closeTo } from './close-to.ts'

/** Models as the head of each file of the NIST Statistical Reference Datasets gives them. */
const models: Record<string, (x: number, b: number[]) => number> = {
  Misra1a: (x, [b1, b2]) => b1! * (1 - Math.exp(-b2! * x)),
  Misra1b: (x, [b1, b2]) => b1! * (1 - (1 + (b2! * x) / 2) ** -2),
  Chwirut2: (x, [b1, b2, b3]) => Math.exp(-b1! * x) / (b2! + b3! * x),
  DanWood: (x, [b1, b2]) => b1! * x ** b2!,
  Gauss1: (x, [b1, b2, b3, b4, b5, b6, b7, b8]) =>
    b1! * Math.exp(-b2! * x) +
    b3! * Math.exp(-((x - b4!) ** 2) / b5! ** 2) +
    b6! * Math.exp(-((x - b7!) ** 2) / b8! ** 2),
  Lanczos3: (x, [b1, b2, b3, b4, b5, b6]) =>
    b1! * Math.exp(-b2! * x) + b3! * Math.exp(-b4! * x) + b5! * Math.exp(-b6! * x),
  Kirby2: (x, [b1, b2, b3, b4, b5]) => (b1! + b2! * x + b3! * x * x) / (1 + b4! * x + b5! * x * x),
  MGH17: (x, [b1, b2, b3, b4, b5]) => b1! + b2! * Math.exp(-x * b4!) + b3! * Math.exp(-x * b5!),
  Thurber: (x, [b1, b2, b3, b4, b5, b6, b7]) =>
    (b1! + b2! * x + b3! * x * x + b4! * x ** 3) / (1 + b5! * x + b6! * x * x + b7! * x ** 3),
  Rat42: (x, [b1, b2, b3]) => b1! / (1 + Math.exp(b2! - b3! * x)),
  Eckerle4: (x, [b1, b2, b3]) => (b1! / b2!) * Math.exp(-0.5 * ((x - b3!) / b2!) ** 2),
}

interface DataSet {
  start: number[]
  certified: number[]
  deviations: number[]
  residualSd: number
  x: number[]
  y: number[]
}

function readDataSet(name: string): DataSet {
  const lines = readFileSync(referencePath(`nist-strd/${name}.dat`), 'utf8').split(/\r?\n/)
  const rows = lines
    .map((line) => /^\s*b\d+ =\s*(.*)$/.exec(line)?.[1])
    .filter((row) => row !== undefined)
    .map((row) => row.trim().split(/\s+/).map(Number))
  const dataFrom = lines.findLastIndex((line) => line.startsWith('Data:')) + 1
  const data = lines
    .slice(dataFrom)
    .filter((line) => line.trim() !== '')
    .map((line) => line.trim().split(/\s+/).map(Number))
  return {
    start: rows.map((row) => row[1]!),
    certified: rows.map((row) => row[2]!),
    deviations: rows.map((row) => row[3]!),
    residualSd: Number(/Residual Standard Deviation:\s*(\S+)/.exec(lines.join('\n'))![1]),
    x: data.map((row) => row[1]!),
    y: data.map((row) => row[0]!),
  }
}

describe('least squares against certified values (NIST StRD, reference/nist-strd, second start)', () => {
  it.each(Object.keys(models))('%s: parameters to six digits, standard deviations to four', (name) => {
    const { start, certified, deviations, residualSd, x, y } = readDataSet(name)
    expect(x.length).toBeGreaterThan(5)
    const outcome = minimise({
      parameters: start.map((b, j) => ({
        name: `b${j + 1}`,
        lower: -Infinity,
        upper: Infinity,
        scale: Math.abs(b) / 1000,
      })),
      start,
      // With u = the certified residual deviation the unscaled covariance is the certified one.
      estimator: leastSquaresEstimator(
        y,
        y.map(() => residualSd),
      ),
      model: (b, out) => x.forEach((at, i) => (out[i] = models[name]!(at, b))),
    })
    expect(outcome.failure).toBeNull()
    certified.forEach((b, j) => {
      closeTo(outcome.values[j], b, 1e-6)
      closeTo(Math.sqrt(outcome.covariance[j]![j]!), deviations[j]!, 1e-4)
    })
  })
})

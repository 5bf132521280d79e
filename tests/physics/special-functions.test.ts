import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { correctDeadTime } from '../../server/physics/statistics/dead-time.ts'
import { dispersionOf } from '../../server/physics/statistics/dispersion.ts'
import { chiSquaredQuantile, chiSquaredTwoSided } from '../../server/physics/special/chi-squared.ts'
import { erf, erfc, erfcx } from '../../server/physics/special/error-function.ts'
import { ALPHA_ONE_SIGMA, garwoodInterval, UPPER_AT_ZERO } from '../../server/physics/special/garwood.ts'
import { incompleteGamma } from '../../server/physics/special/incomplete-gamma.ts'
import { smallestRootOfYExpMinusY } from '../../server/physics/special/lambert-w.ts'
import { logGamma } from '../../server/physics/special/log-gamma.ts'
import { referencePath } from '../support/reference.ts'
import { closeTo } from './close-to.ts'

describe('special functions against closed forms', () => {
  it('log-gamma: factorials and Gamma(1/2) = sqrt(pi)', () => {
    closeTo(logGamma(0.5), Math.log(Math.PI) / 2, 1e-14)
    let factorial = 1
    for (let n = 1; n <= 20; n++) {
      factorial *= n
      closeTo(logGamma(n + 1), Math.log(factorial), 1e-14)
    }
  })

  it('incomplete gamma: P(1, x) = 1 - exp(-x), and Poisson sums for whole a', () => {
    for (const x of [1e-8, 0.3, 1, 5, 30]) {
      closeTo(incompleteGamma(1, x).lower, -Math.expm1(-x), 1e-14)
      closeTo(incompleteGamma(1, x).upper, Math.exp(-x), 1e-13)
    }
    // Q(a, x) = sum of exp(-x) x^k/k! for k < a (closed form).
    for (const [a, x] of [
      [5, 2],
      [5, 12],
      [40, 30],
      [40, 60],
    ] as const) {
      let term = Math.exp(-x)
      let sum = 0
      for (let k = 0; k < a; k++) {
        sum += term
        term *= x / (k + 1)
      }
      closeTo(incompleteGamma(a, x).upper, sum, 1e-12)
    }
  })

  it('chi-squared: with two degrees of freedom the quantile is -2 ln(1 - p)', () => {
    for (const p of [1e-6, 0.025, 0.5, 0.975, 0.999999])
      closeTo(chiSquaredQuantile(p, 2), -2 * Math.log1p(-p), 1e-10)
    expect(chiSquaredQuantile(0, 4)).toBe(0)
  })

  it('error functions: closed form of alpha (definitions.md check 1) and identities', () => {
    closeTo(ALPHA_ONE_SIGMA, 0.317310507863, 1e-11)
    // erf(1), erfc(2), erfc(5): Abramowitz & Stegun table 7.1 and 7.3.
    closeTo(erf(1), 0.8427007929, 1e-10)
    closeTo(erfc(2), 0.004677734981047, 1e-12)
    closeTo(erfc(5), 1.5374597944e-12, 1e-9)
    for (const x of [0, 0.4, 1.49, 1.51, 3, 8]) {
      closeTo(erfcx(x), Math.exp(x * x) * erfc(x), 1e-12)
      closeTo(erfc(-x), 2 - erfc(x), 1e-14)
    }
    closeTo(erfcx(1e6), 1 / (1e6 * Math.sqrt(Math.PI)), 1e-11)
  })

  it('smallest root of y exp(-y)', () => {
    for (const y of [0, 1e-9, 0.05, 0.5, 0.95]) closeTo(smallestRootOfYExpMinusY(y * Math.exp(-y)), y, 1e-12)
  })
})

describe('Garwood interval', () => {
  it('closed form values (definitions.md checks 2 to 4)', () => {
    closeTo(UPPER_AT_ZERO, 1.84102164501, 1e-11)
    expect(garwoodInterval(0)[0]).toBe(0)
    closeTo(garwoodInterval(1)[0], 0.172753779023, 1e-11)
    closeTo(garwoodInterval(1)[1], 3.29952655912, 1e-11)
    closeTo(garwoodInterval(5)[0], 2.84030885559, 1e-11)
    closeTo(garwoodInterval(5)[1], 8.38247265215, 1e-11)
  })

  it('table of 68.27 % intervals in reference/poisson_intervals.json', () => {
    const table = JSON.parse(readFileSync(referencePath('poisson_intervals.json'), 'utf8'))
    const rows: [number, number, number][] = table.garwood['68.27']
    expect(rows.length).toBeGreaterThan(10)
    for (const [n, low, high] of rows) {
      expect(Math.abs(garwoodInterval(n)[0] - low)).toBeLessThan(1e-5)
      expect(Math.abs(garwoodInterval(n)[1] - high)).toBeLessThan(1e-5)
    }
  })
})

describe('rates', () => {
  it('dead time, closed form (definitions.md checks 5 and 6)', () => {
    const fixed = correctDeadTime(1e6, 1, { ps: 50_000, uPs: 0, kind: 'non-extending' })
    closeTo(fixed.rate, 1052631.57895, 1e-11)
    closeTo(fixed.u, 1052.63157895, 1e-11)
    const extending = correctDeadTime(1e6, 1, { ps: 50_000, uPs: 0, kind: 'extending' })
    closeTo(extending.rate, 1054119.67103, 1e-11)
    closeTo(extending.u, 1055.6656209, 1e-10)
  })

  it('u of the dead time moves R0 as its derivative says', () => {
    for (const kind of ['non-extending', 'extending'] as const) {
      const at = (ps: number) => correctDeadTime(1e6, 1, { ps, uPs: 0, kind }).rate
      const withU = correctDeadTime(1e6, 1, { ps: 50_000, uPs: 1000, kind }).u
      const countsOnly = correctDeadTime(1e6, 1, { ps: 50_000, uPs: 0, kind }).u
      closeTo(Math.sqrt(withU ** 2 - countsOnly ** 2), ((at(50_001) - at(49_999)) / 2) * 1000, 1e-6)
    }
  })

  it('dispersion, closed form (definitions.md check 32)', () => {
    const { value, u, chi2, p, dof } = dispersionOf([3, 5, 4, 6, 2, 4, 7, 1])!
    expect([value, chi2, dof]).toEqual([1, 7, 7])
    closeTo(u, 0.534522483825, 1e-11)
    closeTo(p, 0.857759715106, 1e-11)
    // Check 18: F 0.15 with 7 degrees of freedom.
    closeTo(chiSquaredTwoSided(1.05, 7), 0.0120377134285, 1e-10)
  })

  it('dispersion does not exist below two bins or without counts', () => {
    expect(dispersionOf([5])).toBeNull()
    expect(dispersionOf([0, 0, 0])).toBeNull()
  })
})

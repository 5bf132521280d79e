import { describe, expect, it } from 'vitest'
import {
  meanGaussian,
  meanOneSided,
  meanTwoSided,
  oneSidedExponential,
  sigmaOfFwhm,
  twoSidedExponential,
} from '../../server/physics/fits/gaussian-response.ts'
import type { FitModel } from '../../server/physics/fits/model.ts'
import { drivenDip } from '../../server/physics/fits/models/driven.ts'
import { fitModels, fitModelNames } from '../../server/physics/fits/models/index.ts'
import { gaussLegendre, meanByQuadrature } from '../../server/physics/fits/quadrature.ts'
import { erfcx } from '../../server/physics/special/error-function.ts'
import { complexErfcx } from '../../server/physics/special/faddeeva.ts'
import { closeTo } from './close-to.ts'

describe('closed form of the models (definitions.md)', () => {
  it('check 20: exp(-|x|/1000) with sigma 200', () => {
    closeTo(twoSidedExponential(300, 1000, 200), 0.743995845136, 1e-11)
    closeTo(twoSidedExponential(0, 1000, 200), 0.858479616467, 1e-11)
  })

  it('check 21: t 8000, FWHM 495, at 0', () =>
    closeTo(twoSidedExponential(0, 8000, sigmaOfFwhm(495)), 0.979375315772, 1e-11))

  it('check 22: one-sided exponential', () =>
    closeTo(oneSidedExponential(300, 1000, 200), 0.682623509041, 1e-11))

  it('check 23: two-level, mean over a bin', () => {
    closeTo(fitModels['two-level'].mean(-250, 250, 0, [0, 8000, 0]), 0.015463503243, 1e-10)
  })

  it('check 24: driven emitter above, below and near the threshold', () => {
    closeTo(1 - drivenDip(1, 3, 1), 1.44897178879, 1e-11)
    closeTo(1 - drivenDip(2, 0.25, 1), 0.442174599629, 1e-11)
    closeTo(1 - drivenDip(2, 0.1, 1), 0.406495099636, 1e-11)
    closeTo(drivenDip(2, 0.25 + 1e-7, 1), drivenDip(2, 0.25, 1), 1e-6)
  })

  it('check 25: three-level', () => {
    closeTo(fitModels['three-level'].mean(1 - 1e-6, 1 + 1e-6, 0, [0.9, 0.5, 1, 10, 0]), 0.910539592535, 1e-9)
  })

  it('check 26: FWHM of the line times tc', () => {
    closeTo(fitModels['chaotic-lorentzian'].linewidth!.factor / 1e12, 0.318309886184, 1e-11)
    closeTo(fitModels['chaotic-gaussian'].linewidth!.factor / 1e12, 0.664282470268, 1e-11)
  })

  it('nothing overflows far from zero or with a wide response', () => {
    for (const [x, t, sigma] of [
      [1e6, 1, 1000],
      [-1e6, 1, 1000],
      [1e6, 1000, 1],
      [-1e6, 1000, 1],
      [0, 1, 1e5],
    ] as const) {
      const value = oneSidedExponential(x, t, sigma)
      expect(value).toBeGreaterThanOrEqual(0)
      expect(value).toBeLessThanOrEqual(1)
    }
  })
})

describe('means over a bin', () => {
  /** Plain quadrature of the point-wise form, with pieces short against every scale. */
  const plain = (f: (x: number) => number, from: number, to: number) => meanByQuadrature(f, from, to, 0, 20)

  it.each([
    [0, 300],
    [-250, 250],
    [-700, -200],
    [1000, 1500],
  ])('closed forms equal quadrature over [%d, %d]', (from, to) => {
    closeTo(
      meanTwoSided(from, to, 800, 120),
      plain((x) => twoSidedExponential(x, 800, 120), from, to),
      1e-10,
    )
    closeTo(
      meanTwoSided(from, to, 800, 0),
      plain((x) => twoSidedExponential(x, 800, 0), from, to),
      1e-10,
    )
    closeTo(
      meanOneSided(from, to, 800, 120),
      plain((x) => oneSidedExponential(x, 800, 120), from, to),
      1e-10,
    )
    const s = 500
    const smooth = Math.hypot(s, 120)
    const gauss = (x: number) => (s / smooth) * Math.exp((-x * x) / (2 * smooth * smooth))
    closeTo(meanGaussian(from, to, s, 120), plain(gauss, from, to), 1e-10)
  })

  it.each([
    [0, 300],
    [-250, 250],
    [100, 103],
  ])('a response by quadrature equals the closed form over [%d, %d]', (from, to) => {
    for (const sigma of [1, 40, 400]) {
      const byQuadrature = meanByQuadrature((x) => Math.exp(-Math.abs(x) / 800), from, to, sigma, 400)
      closeTo(byQuadrature, meanTwoSided(from, to, 800, sigma), 1e-9)
    }
  })

  it('the driven emitter at weak drive relaxes as two exponentials do', () => {
    const [rabi, gamma] = [1e-4, 1e-3]
    const m = Math.sqrt(gamma ** 2 / 16 - rabi ** 2)
    const decay = (3 * gamma) / 4
    const [slow, fast] = [1 / (decay - m), 1 / (decay + m)]
    const mean =
      ((1 + decay / m) / 2) * meanTwoSided(-100, 400, slow, 150) +
      ((1 - decay / m) / 2) * meanTwoSided(-100, 400, fast, 150)
    closeTo(fitModels.driven.mean(-100, 400, 150, [0, rabi, gamma, 0]), 1 - mean, 1e-9)
  })

  it.each([
    [0.02, 0.004],
    [0.002, 0.004],
    [0.0010004, 0.004],
  ])('the driven emitter equals quadrature, rabi %d and gamma %d', (rabi, gamma) => {
    for (const sigma of [0, 30, 150]) {
      for (const [from, to] of [
        [-60, 90],
        [200, 260],
        [-500, -100],
      ] as const) {
        const byQuadrature = meanByQuadrature((x) => drivenDip(x, rabi, gamma), from, to, sigma, 20)
        const mean = fitModels.driven.mean(from, to, sigma, [0, rabi, gamma, 0])
        expect(Math.abs(1 - mean - byQuadrature)).toBeLessThan(1e-9)
      }
    }
  })

  it('complex erfcx: real axis, and erfcx(iy) = exp(-y^2) (1 - i erfi(y)) as its real part', () => {
    for (const x of [0, 0.3, 1, 4, 50]) closeTo(complexErfcx({ re: x, im: 0 }).re, erfcx(x), 1e-12)
    for (const y of [0.1, 1, 3, 5])
      expect(Math.abs(complexErfcx({ re: 0, im: y }).re - Math.exp(-y * y))).toBeLessThan(1e-12)
    const [above, below] = [complexErfcx({ re: 0.7, im: 2 }), complexErfcx({ re: 0.7, im: -2 })]
    expect(above).toEqual({ re: below.re, im: -below.im })
  })

  it('Gauss-Legendre: twenty points are exact for x^38', () => {
    const { nodes, weights } = gaussLegendre(20)
    closeTo(
      nodes.reduce((sum, x, i) => sum + weights[i]! * x ** 38, 0),
      2 / 39,
      1e-13,
    )
  })

  it('every model tells its g2(0) as its own value in a narrow bin at zero', () => {
    const values: Record<string, number[]> = {
      'two-level': [0.2, 900, 0],
      'three-level': [0.7, 0.4, 900, 5000, 0],
      driven: [0.2, 0.01, 0.002, 0],
      'chaotic-lorentzian': [0.6, 900, 0],
      'chaotic-gaussian': [0.6, 900, 0],
      coherent: [],
    }
    for (const name of fitModelNames) {
      const model: FitModel = fitModels[name]
      if (model.atZero === undefined) continue
      const { parameter, offset, slope } = model.atZero
      const stated = offset + slope * (parameter === null ? 0 : values[name]![parameter]!)
      closeTo(model.mean(-1e-4, 1e-4, 0, values[name]!), stated, 1e-6)
    }
  })
})

import { describe, expect, it } from 'vitest'
import { powerSpectrum } from '../../server/physics/kernels/fourier/fourier.ts'
import type { PulsedResult } from '../../server/physics/kinds/pulsed-correlation/definition.ts'
import {
  centralOverSide,
  sideScatterOf,
  withoutFloor,
} from '../../server/physics/kinds/pulsed-correlation/derive.ts'
import { closeTo } from './close-to.ts'
import { readExpected, readReferenceTags } from './reference-tags.ts'
import { recordOf, runKind } from './run-kind.ts'
import { poissonTimes, seeded } from './seeded.ts'

const pulsed = (parameters: unknown, ...records: ReturnType<typeof recordOf>[]) =>
  runKind<PulsedResult>('pulsed-correlation', parameters, ...records)

const expected = readExpected()['emitter-pulsed'].pulsed![0]!
const parameters = { a: 1, b: 2, peakWindowPs: expected.peakWindowPs, sidePeaks: expected.sidePeaks }

/** A_0 120 and sides 1000 1020 980 1010 990 1005 995 1000: definitions.md checks 17 and 18. */
const example = [1000, 1020, 980, 1010, 120, 990, 1005, 995, 1000].map((counts, i) => ({ m: i - 4, counts }))

describe('pulsed correlation', () => {
  it('reference record: every peak and g2(0) (expected.json)', async () => {
    const { result } = await pulsed(
      { ...parameters, periodPs: expected.periodPs },
      readReferenceTags('emitter-pulsed'),
    )
    expect(result.peaks.map(({ m, counts }) => ({ m, counts }))).toEqual(expected.peaks)
    closeTo(result.g2Zero.value, expected.g2Zero, 1e-12)
    expect(result.periodPs).toEqual({ value: 12500, u: null, unit: 'ps' })
  })

  it('finds the period of the reference record (simulated with 12.5 ns)', async () => {
    const { result } = await pulsed(parameters, readReferenceTags('emitter-pulsed'))
    expect(Math.abs(result.periodPs.value! - 12500)).toBeLessThan(4 * result.periodPs.u!)
    expect(result.periodPs.u!).toBeLessThan(0.5)
    closeTo(result.g2Zero.value, expected.g2Zero, 0.01)
  })

  it('closed form (definitions.md checks 17 and 18)', () => {
    closeTo(centralOverSide(example).value, 0.12, 1e-12)
    closeTo(centralOverSide(example).u, 0.0110363037291, 1e-11)
    const scatter = sideScatterOf(example)
    closeTo(scatter.value, 0.15, 1e-12)
    closeTo(scatter.chi2, 1.05, 1e-12)
    closeTo(scatter.p, 0.0120377134285, 1e-10)
    expect([scatter.dof, scatter.mean]).toEqual([7, 1000])
  })

  it('a floor of dark counts is taken out of every peak', () => {
    const corrected = withoutFloor(example, { counts: 160, widthPs: 2000 }, 4000)
    // f0 = 160/(8 x 2000) a ps, so 40 in a peak window.
    closeTo(corrected.value, 80 / 960, 1e-12)
    const g = 80 / 960
    closeTo(
      corrected.u,
      Math.sqrt(120 + (g ** 2 * 1000) / 8 + ((1 - g) ** 2 * 4000 ** 2 * 0.01 ** 2) / 160) / 960,
      1e-12,
    )
    const none = withoutFloor(example, { counts: 0, widthPs: 2000 }, 4000)
    closeTo(none.value, 0.12, 1e-12)
  })

  it('no pair in the central peak: upper limit', () => {
    const empty = example.map((p) => (p.m === 0 ? { ...p, counts: 0 } : p))
    expect(centralOverSide(empty)).toMatchObject({ value: 0, u: null })
    closeTo(centralOverSide(empty).upper, 1.841021645e-3, 1e-9)
  })

  it('slope: side peaks that fall with |m| are told as blinking', () => {
    const falling = Array.from({ length: 21 }, (_, i) => ({
      m: i - 10,
      counts: i === 10 ? 10 : 1000 - 20 * Math.abs(i - 10),
    }))
    const { slope, mean } = sideScatterOf(falling)
    closeTo(slope.value, -20 / mean, 1e-12)
    expect(slope.value!).toBeLessThan(-3 * slope.u!)
  })

  it('refuses one channel, overlapping windows and light without a period', async () => {
    const record = readReferenceTags('emitter-pulsed')
    await expect(pulsed({ ...parameters, b: 1, periodPs: 12500 }, record)).rejects.toMatchObject({
      errors: [{ pointer: '/parameters/b' }],
    })
    await expect(pulsed({ ...parameters, periodPs: 5000 }, record)).rejects.toThrow(/wider than the period/)
    await expect(pulsed({ ...parameters, periodPs: 12500, floorWindowPs: 7000 }, record)).rejects.toThrow(
      /exceed the period/,
    )
    const random = seeded(21)
    const steady = recordOf(
      [1, 2].flatMap((c) => poissonTimes(random, 1e-7, 2e11).map((t): [number, number] => [t, c])),
    )
    await expect(pulsed(parameters, steady)).rejects.toThrow(/no period/)
  })

  it('power spectrum of a cosine: all power in its own bin (closed form)', () => {
    const n = 64
    const spectrum = powerSpectrum(
      Float64Array.from({ length: n }, (_, i) => Math.cos((2 * Math.PI * 5 * i) / n)),
    )
    closeTo(spectrum[5], (n / 2) ** 2, 1e-12)
    expect(spectrum.every((p, j) => j === 5 || p < 1e-18)).toBe(true)
    const parseval = powerSpectrum(Float64Array.of(1, 2, 3, 4))
    closeTo(parseval[0], 100, 1e-15)
    closeTo(parseval[2], 4, 1e-15)
  })
})

import { describe, expect, it } from 'vitest'
import { correctedQuantity, signalShare } from '../../server/physics/kinds/correlation/background.ts'
import { g2Bins } from '../../server/physics/kinds/correlation/bins.ts'
import type { CorrelationResult } from '../../server/physics/kinds/correlation/definition.ts'
import { closeTo } from './close-to.ts'
import { readExpected, readReferenceTags } from './reference-tags.ts'
import { recordOf, runKind } from './run-kind.ts'

const correlation = (parameters: unknown, ...records: ReturnType<typeof recordOf>[]) =>
  runKind<CorrelationResult>('correlation', parameters, ...records)

const expected = readExpected()

describe('correlation of the reference records (reference/tags/expected.json)', () => {
  const cases = (['emitter-cw', 'chaotic'] as const).flatMap((name) =>
    expected[name].correlation!.map((x) => ({ name, ...x })),
  )

  it.each(cases)(
    '$name: channels $a and $b, bin $binPs, offset $offsetPs: every bin',
    async ({ name, ...x }) => {
      const { a, b, binPs, halfRangePs, offsetPs } = x
      const { result } = await correlation({ a, b, binPs, halfRangePs, offsetPs }, readReferenceTags(name))
      expect(result.counts).toEqual(x.counts)
      expect(result.delaysPs).toEqual(x.delaysPs)
      x.g2.forEach((g, k) => closeTo(result.g2[k], g, 1e-9))
    },
  )

  it('two-level fit of emitter-cw finds t1 = 8 ns within 3 u', async () => {
    const parameters = { a: 1, b: 2, binPs: 500, halfRangePs: 60000, fit: { model: 'two-level' } }
    const { result } = await correlation(parameters, readReferenceTags('emitter-cw'))
    const { t1 } = result.fit!.parameters
    expect(result.fit!.converged).toBe(true)
    expect(Math.abs(t1!.value! - 8000)).toBeLessThan(3 * t1!.u!)
    expect(t1!.u!).toBeLessThan(1600)
    expect(result.g2Zero).toMatchObject({ value: 0, u: null, method: 'bin', binPs: 500 })
  })

  it('Lorentzian fit of chaotic light finds tc = 2 us and beta = 1 within 3 u', async () => {
    const parameters = {
      a: 1,
      b: 2,
      binPs: 200000,
      halfRangePs: 12000000,
      fit: { model: 'chaotic-lorentzian' },
    }
    const { result } = await correlation(parameters, readReferenceTags('chaotic'))
    const { tc, beta } = result.fit!.parameters
    expect(result.fit!.converged).toBe(true)
    expect(Math.abs(tc!.value! - 2e6)).toBeLessThan(3 * tc!.u!)
    expect(Math.abs(beta!.value! - 1)).toBeLessThan(3 * beta!.u!)
    closeTo(result.fit!.linewidth!.value! * tc!.value!, 0.318309886184e12, 1e-11)
  })

  it('a run of 260 000 tags takes well under a second of processor time', async () => {
    const record = readReferenceTags('emitter-cw')
    const before = process.cpuUsage()
    await correlation({ a: 1, b: 2, binPs: 500, halfRangePs: 60000 }, record)
    const { user, system } = process.cpuUsage(before)
    expect((user + system) / 1e6).toBeLessThan(1)
  })
})

describe('bins in closed form (definitions.md)', () => {
  it('check 7: norm, g2 and u of a bin', async () => {
    // N_A 1e5, N_B 8e4, b 500, k 10, T 1e12 ps, n 5.
    const norm = (1e5 * 8e4 * 500 * (1e12 - 5000)) / 1e12 / 1e12
    closeTo(norm, 3.99999998, 1e-12)
    const bins = g2Bins([5], [norm], -1)
    closeTo(bins.g2[0], 1.25000000625, 1e-11)
    closeTo(bins.u[0], 0.55901699717, 1e-8)
  })

  it('check 8: an empty bin has an upper end and no u', () => {
    const bins = g2Bins([0], [4], -1)
    expect([bins.g2[0], bins.u[0], bins.g2Low[0]]).toEqual([0, null, 0])
    closeTo(bins.g2Up[0], 0.460255411252, 1e-11)
  })

  it('zero delay of one channel: counts come in twos', () => {
    const bins = g2Bins([8], [4], 0)
    closeTo(bins.u[0], Math.sqrt(16) / 4, 1e-14)
    closeTo(bins.g2Up[0], (2 * 7.16275) / 4, 1e-5)
  })

  it('check 19: background of unequal fractions', () => {
    const share = signalShare(
      { rhoA: 0.8, rhoB: 0.6, uRhoA: 0.01, uRhoB: 0.02 },
      { countsA: 0, countsB: 0, durationS: 1 },
    )
    const corrected = correctedQuantity({ value: 0.616, u: 0.02, unit: '1' }, share)
    closeTo(corrected.value, 0.2, 1e-12)
    closeTo(corrected.u, 0.0504700130991, 1e-11)
  })

  it('background as rates and as one fraction', () => {
    const seen = { countsA: 1e6, countsB: 1e6, durationS: 10 }
    const rate = { value: 2e4, u: 100, unit: 'cps' as const }
    const byRates = signalShare({ rateA: rate, rateB: rate }, seen)
    closeTo(byRates.q, 0.64, 1e-12)
    const uRho = Math.hypot(100 / 1e5, (2e4 / 1e10) * 100)
    closeTo(byRates.relativeU, (Math.SQRT2 * uRho) / 0.8, 1e-12)
    closeTo(signalShare({ rho: 0.8, uRho: 0.01 }, seen).relativeU, 0.025, 1e-12)
  })
})

describe('correlation by hand', () => {
  const record = recordOf([
    [0, 1],
    [1000, 2],
    [2000, 1],
    [2990, 2],
    [100_000, 1],
  ])

  it('the cable offset is subtracted from the delay and added back in the norm', async () => {
    const { result } = await correlation({ a: 1, b: 2, binPs: 10, halfRangePs: 20, offsetPs: 995 }, record)
    expect(result.delaysPs).toEqual([-20, -10, 0, 10, 20])
    // 1000 - 0 - 995 = 5 opens bin 1; 2990 - 2000 - 995 = -5 opens bin 0.
    expect(result.counts).toEqual([0, 0, 1, 1, 0])
    closeTo(result.g2[3], 1 / ((3 * 2 * 10 * (100_000 - 1005)) / 1e10), 1e-12)
  })

  it('corrected g2 appears only with a background, and raw g2(0) stays', async () => {
    const plain = (await correlation({ a: 1, b: 2, binPs: 500, halfRangePs: 2000 }, record)).result
    expect(plain).not.toHaveProperty('g2ZeroCorrected')
    const parameters = { a: 1, b: 2, binPs: 500, halfRangePs: 2000, background: { rho: 0.9, uRho: 0.01 } }
    const { result } = await correlation(parameters, record)
    expect(result.g2Zero).toEqual(plain.g2Zero)
    closeTo(result.g2ZeroCorrected!.value, 1 - 1 / 0.81, 1e-12)
    expect(result.g2Corrected!.length).toBe(result.g2.length)
  })

  it('refuses an offset of a channel against itself, and a range as long as the record', async () => {
    await expect(
      correlation({ a: 1, b: 1, binPs: 10, halfRangePs: 20, offsetPs: 5 }, record),
    ).rejects.toMatchObject({
      errors: [{ pointer: '/parameters/offsetPs' }],
    })
    await expect(correlation({ a: 1, b: 2, binPs: 10, halfRangePs: 99_990 }, record)).rejects.toMatchObject({
      errors: [{ pointer: '/parameters/halfRangePs' }],
    })
    await expect(
      correlation(
        { a: 1, b: 2, binPs: 1, halfRangePs: 10, fit: { model: 'two-level', start: { tc: 1 } } },
        record,
      ),
    ).rejects.toThrow(/has no parameter "tc"/)
  })

  it('an empty channel gives null g2 and a note, and refuses a fit', async () => {
    const { result, codes } = await correlation({ a: 1, b: 7, binPs: 10, halfRangePs: 20 }, record)
    expect(result.g2.every((g) => g === null)).toBe(true)
    expect(codes).toContain('zero-denominator')
    const fit = { a: 1, b: 7, binPs: 10, halfRangePs: 20, fit: { model: 'coherent' } }
    await expect(correlation(fit, record)).rejects.toThrow(/nothing to fit/)
  })

  it('two inputs are pooled: counts add, g2 stays', async () => {
    const tags = readReferenceTags('chaotic')
    const parameters = { a: 1, b: 2, binPs: 200000, halfRangePs: 4000000 }
    const one = (await correlation(parameters, tags)).result
    const two = (await correlation(parameters, tags, tags)).result
    expect(two.counts).toEqual(one.counts.map((n) => 2 * n))
    two.g2.forEach((g, k) => closeTo(g, one.g2[k]!, 1e-12))
    closeTo(two.u[0], one.u[0]! / Math.SQRT2, 1e-12)
  })
})

import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { partnerFlags } from '../../server/physics/kernels/partner-flags/partner-flags.ts'
import type { HeraldedResult } from '../../server/physics/kinds/heralded/definition.ts'
import { heraldedG2, heraldingEfficiency } from '../../server/physics/kinds/heralded/derive.ts'
import { closeTo } from './close-to.ts'
import { readExpected, readReferenceTags } from './reference-tags.ts'
import { recordOf, runKind } from './run-kind.ts'

const heralded = (parameters: unknown, ...records: ReturnType<typeof recordOf>[]) =>
  runKind<HeraldedResult>('heralded', parameters, ...records)

describe('heralded source', () => {
  it.each(readExpected().heralded.heralded!)(
    'reference record, windows $windowAPs and $windowBPs ps (expected.json)',
    async (x) => {
      const { heralds, heraldsWithA, heraldsWithB, heraldsWithBoth, g2, ...parameters } = x
      const { result } = await heralded(parameters, readReferenceTags('heralded'))
      expect(result).toMatchObject({ heralds, heraldsWithA, heraldsWithB, heraldsWithBoth })
      closeTo(result.g2.value, g2!, 1e-12)
      expect(result.delays.a.reduce((a, b) => a + b)).toBeGreaterThanOrEqual(heraldsWithA!)
    },
  )

  it('closed form (definitions.md checks 15 and 16)', () => {
    const counts = { heralds: 1e5, heraldsWithA: 2e4, heraldsWithB: 1.5e4, heraldsWithBoth: 60 }
    closeTo(heraldedG2(counts).value, 0.02, 1e-12)
    closeTo(heraldedG2(counts).u, 0.00257218972862, 1e-11)
    closeTo(heraldedG2({ ...counts, heraldsWithBoth: 0 }).upper, 0.00061367388167, 1e-11)
    closeTo(heraldingEfficiency(2e4, 1e5).value, 0.2, 1e-12)
    closeTo(heraldingEfficiency(2e4, 1e5).u, 0.00126491106407, 1e-11)
  })

  it('limits at efficiencies 0 and 1, and no u where every arm fires', () => {
    closeTo(heraldingEfficiency(0, 1000).upper, 1.841021645e-3, 1e-9)
    expect(heraldingEfficiency(1000, 1000)).toMatchObject({ value: 1, u: null })
    closeTo(heraldingEfficiency(1000, 1000).lower, 1 - 1.841021645e-3, 1e-9)
    const all = { heralds: 100, heraldsWithA: 100, heraldsWithB: 100, heraldsWithBoth: 100 }
    expect(heraldedG2(all).value).toBe(1)
    expect(heraldedG2({ ...all, heraldsWithA: 0, heraldsWithBoth: 0 }).value).toBeNull()
  })

  it('flags equal brute force', () => {
    const times = fc
      .array(fc.bigInt({ min: 0n, max: 200n }), { maxLength: 30 })
      .map((list) => BigInt64Array.from(list).sort())
    fc.assert(
      fc.property(
        times,
        times,
        fc.bigInt({ min: -60n, max: 60n }),
        fc.bigInt({ min: 1n, max: 40n }),
        (starts, stops, lo, width) => {
          const expected = Array.from(starts, (s) =>
            stops.some((t) => lo <= t - s && t - s < lo + width) ? 1 : 0,
          )
          expect(Array.from(partnerFlags(starts, stops, lo, width))).toEqual(expected)
        },
      ),
    )
    const far = 2n ** 53n
    expect(
      Array.from(partnerFlags(BigInt64Array.of(0n, 5n), BigInt64Array.of(far + 4n), 0n, far + 1n)),
    ).toEqual([0, 1])
  })

  it('pools several inputs and refuses an arm on the herald channel', async () => {
    const record = recordOf([
      [0, 0],
      [10, 1],
      [12, 2],
      [100, 0],
      [109, 1],
      [200, 0],
      [300, 2],
    ])
    const parameters = { herald: 0, a: 1, b: 2, windowAPs: 5, delayAPs: 10, windowBPs: 5, delayBPs: 12 }
    const one = (await heralded(parameters, record)).result
    expect([one.heralds, one.heraldsWithA, one.heraldsWithB, one.heraldsWithBoth]).toEqual([3, 2, 1, 1])
    expect((await heralded(parameters, record, record)).result.heraldsWithA).toBe(4)
    await expect(heralded({ ...parameters, a: 0 }, record)).rejects.toMatchObject({
      errors: [{ pointer: '/parameters/a' }],
    })
  })
})

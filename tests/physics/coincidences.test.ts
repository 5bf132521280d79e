import { describe, expect, it } from 'vitest'
import type { CoincidencesResult } from '../../server/physics/kinds/coincidences/definition.ts'
import { deriveCoincidences } from '../../server/physics/kinds/coincidences/derive.ts'
import type { PairCounts } from '../../server/physics/kinds/coincidences/pair-statistics.ts'
import { closeTo } from './close-to.ts'
import { readExpected, readReferenceTags } from './reference-tags.ts'
import { recordOf, runKind } from './run-kind.ts'

const coincidences = (parameters: unknown, ...records: ReturnType<typeof recordOf>[]) =>
  runKind<CoincidencesResult>('coincidences', parameters, ...records)

describe('coincidences of the reference records (reference/tags/expected.json)', () => {
  const expected = readExpected()
  const cases = (['emitter-cw', 'heralded'] as const).flatMap((name) =>
    expected[name].coincidences!.map((x) => ({ name, ...x })),
  )

  it.each(cases)('$name: channels $a and $b, window $windowPs at $delayPs ps', async ({ name, ...x }) => {
    const { a, b, windowPs, delayPs, offPeakWindows, offPeakStepPs } = x
    const parameters = { a, b, windowPs, delayPs, offPeakWindows, offPeakStepPs }
    const { result } = await coincidences(parameters, readReferenceTags(name))
    expect(result.counts).toBe(x.counts)
    expect(result.accidentals.offPeakCounts).toBe(x.offPeakCounts)
    closeTo(result.rate.value, x.rate, 1e-12)
    closeTo(result.accidentals.product.value, x.accidentalsProduct, 1e-12)
    closeTo(result.accidentals.offPeak!.value, x.accidentalsOffPeak, 1e-12)
    closeTo(result.g2.value, x.g2, 1e-12)
  })
})

/** N_A 20000, N_B 15000, T 10 s, w 2 us at c = 0, M 5, n_off 240, N_c 1200: definitions.md checks 9 to 14. */
const example: PairCounts = {
  countsA: 20000,
  countsB: 15000,
  durationS: 10,
  pairs: 1200,
  product: 60,
  offPeak: { counts: 240, windows: 10 },
  sameChannel: false,
  holdsZero: true,
  centred: true,
  darkA: { value: 100, u: 0 },
  darkB: { value: 50, u: 0 },
  relativeUDuration: 0,
}

describe('closed form of a coincidence measurement (definitions.md)', () => {
  const offPeak = deriveCoincidences(example, 'offPeak')
  const product = deriveCoincidences(example, 'product')
  it.each([
    ['9 product', offPeak.accidentals.product, 6, 0.0668849758915],
    ['10 off-peak', offPeak.accidentals.offPeak, 2.4, 0.155276006131],
    ['11 true rate, off-peak', offPeak.trueRate, 117.6, 3.46773946814],
    ['11 true rate, product', product.trueRate, 114, 3.46447675703],
    ['12 CAR, off-peak', offPeak.car, 49, 3.50527021117],
    ['12 CAR, product', product.car, 19, 0.542247606419],
    ['13 g2', offPeak.g2, 20, 0.542247606419],
    ['14 eta_A', offPeak.klyshko.a, 0.0811034482759, 0.00229814890239],
    ['14 eta_B', offPeak.klyshko.b, 0.0618947368421, 0.00177202362513],
  ])('%s', (_name, found, value, u) => {
    closeTo(found!.value, value, 1e-11)
    closeTo(found!.u, u, 1e-10)
  })

  it('raw CAR is one more, with the same u', () => {
    expect(offPeak.rawCar).toEqual({ ...offPeak.car, value: offPeak.car.value! + 1 })
  })
})

describe('limits and refusals', () => {
  it('no pair: value 0, u null and an upper limit; CAR is -1', () => {
    const derived = deriveCoincidences({ ...example, pairs: 0 }, 'offPeak')
    expect(derived.rate).toMatchObject({ value: 0, u: null })
    closeTo(derived.rate.upper, 0.1841021645, 1e-9)
    closeTo(derived.g2.upper, 1.841021645 / 60, 1e-9)
    expect(derived.car).toEqual({ value: -1, u: null, unit: '1' })
  })

  it('no off-peak pair: upper limit of the accidentals, no CAR', () => {
    const derived = deriveCoincidences({ ...example, offPeak: { counts: 0, windows: 10 } }, 'offPeak')
    expect(derived.accidentals.offPeak).toMatchObject({ value: 0, u: null })
    closeTo(derived.accidentals.offPeak!.upper, 1.841021645 / 100, 1e-9)
    expect(derived.car.value).toBeNull()
    closeTo(derived.trueRate.value, 120, 1e-12)
  })

  it('one channel with itself: ordered pairs, doubled limits, no true rate', () => {
    const same = { ...example, sameChannel: true, countsB: 20000 }
    const derived = deriveCoincidences(same, 'offPeak')
    closeTo(derived.rate.u, Math.sqrt(2400) / 10, 1e-12)
    closeTo(derived.g2.u, Math.sqrt(2400) / 60, 1e-12)
    closeTo(derived.accidentals.product.u, (2 * 6) / Math.sqrt(20000), 1e-12)
    closeTo(derived.accidentals.offPeak!.u, Math.sqrt(480) / 100, 1e-12)
    expect([derived.trueRate.value, derived.car.value, derived.klyshko.a.value]).toEqual([null, null, null])
    closeTo(deriveCoincidences({ ...same, pairs: 0 }, 'offPeak').g2.upper, (2 * 1.841021645) / 60, 1e-9)
  })

  it('antibunched light: fewer pairs than chance gives a negative true rate and the plain variance', () => {
    const derived = deriveCoincidences({ ...example, pairs: 5 }, 'product')
    closeTo(derived.trueRate.value, -5.5, 1e-12)
    closeTo(derived.trueRate.u, Math.sqrt(5) / 10, 1e-12)
    closeTo(derived.g2.u, Math.sqrt(5) / 60, 1e-12)
  })

  it('u(T) of a declared time is common: once in rates and g2, twice in the product accidentals', () => {
    const derived = deriveCoincidences({ ...example, relativeUDuration: 0.01 }, 'product')
    closeTo(derived.rate.u, Math.hypot(Math.sqrt(1200) / 10, 1.2), 1e-12)
    closeTo(derived.accidentals.product.u, Math.hypot(0.0668849758915, 0.12), 1e-10)
    closeTo(derived.g2.u, Math.hypot(0.542247606419, 0.2), 1e-10)
  })

  it('fills in what is subtracted, and refuses windows that overlap or leave the record', async () => {
    const record = recordOf([
      [0, 1],
      [10, 2],
      [1000, 1],
      [1005, 2],
    ])
    const { result } = await coincidences({ a: 1, b: 2, windowPs: 21 }, record)
    expect(result).toMatchObject({
      counts: 2,
      accidentals: { used: 'product', offPeak: null, offPeakCounts: null },
    })
    const step = { a: 1, b: 2, windowPs: 21, offPeakWindows: 2, offPeakStepPs: 20 }
    await expect(coincidences(step, record)).rejects.toMatchObject({
      errors: [{ pointer: '/parameters/offPeakStepPs' }],
    })
    await expect(coincidences({ a: 1, b: 2, windowPs: 21, offPeakWindows: 2 }, record)).rejects.toThrow(
      /step/,
    )
    await expect(coincidences({ a: 1, b: 2, windowPs: 21, delayPs: 990 }, record)).rejects.toThrow(
      /record lasts/,
    )
  })

  it('two inputs are pooled: counts and norms add', async () => {
    const record = readReferenceTags('heralded')
    const parameters = { a: 0, b: 1, windowPs: 2000, delayPs: 5000, offPeakWindows: 5, offPeakStepPs: 100000 }
    const one = (await coincidences(parameters, record)).result
    const two = (await coincidences(parameters, record, record)).result
    expect(two.counts).toBe(2 * one.counts)
    expect(two.accidentals.offPeakCounts).toBe(2 * one.accidentals.offPeakCounts!)
    closeTo(two.g2.value, one.g2.value!, 1e-12)
    closeTo(two.rate.value, one.rate.value!, 1e-12)
    closeTo(two.accidentals.product.value, one.accidentals.product.value!, 1e-12)
    closeTo(two.rate.u, one.rate.u! / Math.SQRT2, 1e-12)
  })
})

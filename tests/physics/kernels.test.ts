import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { lowerBound, offsetsFrom, pickChannel } from '../../server/physics/kernels/blocks/halves.ts'
import { createPairHistogram } from '../../server/physics/kernels/pair-histogram/pair-histogram.ts'
import { createTrace } from '../../server/physics/kernels/trace/trace.ts'
import { createWindowCount, windowStart } from '../../server/physics/kernels/window-count/window-count.ts'
import { bruteHistogram, bruteWindow } from './oracle.ts'

/** Ascending times near some far place: doubles alone would lose picoseconds there. */
const tagTimes = (most: bigint) =>
  fc
    .tuple(
      fc.constantFrom(0n, -(2n ** 60n), 2n ** 60n + 12345n),
      fc.array(fc.bigInt({ min: 0n, max: most }), { maxLength: 40 }),
    )
    .map(([base, steps]) =>
      BigInt64Array.from(steps.toSorted((a, b) => (a < b ? -1 : a > b ? 1 : 0)).map((t) => base + t)),
    )

const twoChannels = (most: bigint) =>
  fc
    .tuple(tagTimes(most), tagTimes(most))
    .filter(([a, b]) => a.length === 0 || b.length === 0 || a[0]! > 0n === b[0]! > 0n)

/** Cuts both channels at the same times into pieces, in order. */
function pieces(a: BigInt64Array, b: BigInt64Array, edges: bigint[]): [BigInt64Array, BigInt64Array][] {
  const cuts = [...edges].sort((x, y) => (x < y ? -1 : 1))
  const bounds = [null, ...cuts, null]
  return bounds.slice(1).map((to, i) => {
    const from = bounds[i]!
    const part = (times: BigInt64Array) =>
      times.filter((t) => (from === null || t >= from) && (to === null || t < to))
    return [part(a), part(b)]
  })
}

describe('pair histogram', () => {
  it('equals brute force in every bin, whole and in pieces, near and far from zero', () => {
    fc.assert(
      fc.property(
        twoChannels(300n),
        fc.bigInt({ min: 1n, max: 40n }),
        fc.integer({ min: 0, max: 6 }),
        fc.bigInt({ min: -200n, max: 200n }),
        fc.array(fc.bigInt({ min: 0n, max: 300n }), { maxLength: 4 }),
        ([a, b], binPs, halfBins, offsetPs, cuts) => {
          const options = { binPs, halfBins, offsetPs, sameChannel: false }
          const whole = createPairHistogram(options)
          whole.push(a, b)
          const expected = bruteHistogram(a, b, options)
          expect(Array.from(whole.counts())).toEqual(expected)
          const pushed = createPairHistogram(options)
          const base = a[0] ?? b[0] ?? 0n
          for (const [x, y] of pieces(
            a,
            b,
            cuts.map((c) => base + c),
          ))
            pushed.push(x, y)
          expect(Array.from(pushed.counts())).toEqual(expected)
        },
      ),
      { numRuns: 400 },
    )
  })

  it('pairs no tag with itself in one channel, but equal times with each other in both orders', () => {
    const times = BigInt64Array.from([10n, 10n, 25n])
    const options = { binPs: 1n, halfBins: 15, offsetPs: 0n, sameChannel: true }
    const histogram = createPairHistogram(options)
    histogram.push(times, times)
    const counts = Array.from(histogram.counts())
    expect(counts).toEqual(bruteHistogram(times, times, options))
    expect(counts[15]).toBe(2)
    expect([counts[0], counts[30]]).toEqual([2, 2])
  })

  it('autocorrelation equals brute force in pieces', () => {
    fc.assert(
      fc.property(
        tagTimes(100n),
        fc.bigInt({ min: 1n, max: 9n }),
        fc.bigInt({ min: 0n, max: 100n }),
        (a, binPs, cut) => {
          const options = { binPs, halfBins: 4, offsetPs: 0n, sameChannel: true }
          const pushed = createPairHistogram(options)
          for (const [x] of pieces(a, a, [(a[0] ?? 0n) + cut])) pushed.push(x, x)
          expect(Array.from(pushed.counts())).toEqual(bruteHistogram(a, a, options))
        },
      ),
      { numRuns: 200 },
    )
  })

  it('stays exact where the range is beyond 2^53 ps', () => {
    const binPs = 2n ** 53n
    const a = BigInt64Array.from([0n, 5n])
    const b = BigInt64Array.from([binPs / 2n - 1n, binPs / 2n, binPs / 2n + 5n, 2n ** 55n])
    const options = { binPs, halfBins: 4, offsetPs: 0n, sameChannel: false }
    const histogram = createPairHistogram(options)
    histogram.push(a, b)
    expect(Array.from(histogram.counts())).toEqual(bruteHistogram(a, b, options))
  })

  it('makes no pair across a cut', () => {
    const histogram = createPairHistogram({ binPs: 10n, halfBins: 5, offsetPs: 0n, sameChannel: false })
    histogram.push(BigInt64Array.of(100n), BigInt64Array.of())
    histogram.cut()
    histogram.push(BigInt64Array.of(), BigInt64Array.of(110n))
    expect(histogram.counts().every((n) => n === 0)).toBe(true)
  })

  it('swapping the channels maps d to -d for an odd bin', () => {
    fc.assert(
      fc.property(twoChannels(200n), ([a, b]) => {
        const options = { binPs: 7n, halfBins: 8, offsetPs: 0n, sameChannel: false }
        const forward = createPairHistogram(options)
        const backward = createPairHistogram(options)
        forward.push(a, b)
        backward.push(b, a)
        expect(Array.from(backward.counts())).toEqual(Array.from(forward.counts()).toReversed())
      }),
    )
  })
})

describe('window count', () => {
  it('equals brute force, whole and in pieces', () => {
    fc.assert(
      fc.property(
        twoChannels(300n),
        fc.bigInt({ min: -150n, max: 150n }),
        fc.bigInt({ min: 1n, max: 90n }),
        fc.bigInt({ min: 0n, max: 300n }),
        ([a, b], loPs, widthPs, cut) => {
          const window = createWindowCount({ loPs, widthPs, sameChannel: false })
          for (const [x, y] of pieces(a, b, [(a[0] ?? 0n) + cut])) window.push(x, y)
          expect(window.count()).toBe(bruteWindow(a, b, loPs, widthPs, false))
        },
      ),
      { numRuns: 400 },
    )
  })

  it('leaves self-pairs out only where the window holds zero', () => {
    const times = BigInt64Array.from([0n, 3n, 3n, 9n])
    for (const [lo, width] of [
      [-1n, 2n],
      [0n, 1n],
      [1n, 5n],
      [-4n, 4n],
    ] as const) {
      const window = createWindowCount({ loPs: lo, widthPs: width, sameChannel: true })
      window.push(times, times)
      expect(window.count()).toBe(bruteWindow(times, times, lo, width, true))
    }
  })

  it('for an even width, swapping the channels equals the window at -c + 1 (definitions.md B1)', () => {
    expect(windowStart(0n, 2000n)).toBe(-1000n)
    expect(windowStart(-7500n, 3001n)).toBe(-9000n)
    const a = BigInt64Array.from([0n, 40n, 100n])
    const b = BigInt64Array.from([3n, 38n, 41n, 95n, 106n])
    const count = (x: BigInt64Array, y: BigInt64Array, centre: bigint) => {
      const window = createWindowCount({ loPs: windowStart(centre, 6n), widthPs: 6n, sameChannel: false })
      window.push(x, y)
      return window.count()
    }
    for (let c = -6n; c <= 6n; c++) expect(count(b, a, c)).toBe(count(a, b, -c + 1n))
  })

  it('counts windows wider than 2^52 ps', () => {
    const a = BigInt64Array.from([0n, 7n])
    const b = BigInt64Array.from([2n ** 52n + 6n, 2n ** 52n + 7n, 2n ** 53n + 8n])
    const window = createWindowCount({ loPs: 0n, widthPs: 2n ** 53n + 1n, sameChannel: false })
    window.push(a, b)
    expect(window.count()).toBe(bruteWindow(a, b, 0n, 2n ** 53n + 1n, false))
  })
})

describe('trace', () => {
  it('counts half-open bins and drops what lies outside, in pieces of any size', () => {
    fc.assert(
      fc.property(
        tagTimes(200n),
        fc.bigInt({ min: -20n, max: 20n }),
        fc.bigInt({ min: 1n, max: 50n }),
        fc.nat(40),
        (times, shift, binPs, cut) => {
          const startPs = (times[0] ?? 0n) + shift
          const trace = createTrace({ startPs, binPs, bins: 5 })
          trace.push(times.slice(0, cut))
          trace.push(times.slice(cut))
          const expected = [0, 1, 2, 3, 4].map((k) => {
            const lo = startPs + BigInt(k) * binPs
            return times.filter((t) => t >= lo && t < lo + binPs).length
          })
          expect(Array.from(trace.counts())).toEqual(expected)
        },
      ),
      { numRuns: 300 },
    )
  })
})

describe('64-bit times as doubles from a base', () => {
  it('are exact up to 2^53 apart, on either side of zero and of 2^32', () => {
    const far = [0n, 1n, 2n ** 31n, 2n ** 32n - 1n, 2n ** 32n, 2n ** 53n - 1n]
    for (const base of [0n, -1n, -(2n ** 61n), 2n ** 61n - 1n, 2n ** 32n - 1n]) {
      const out = new Float64Array(far.length)
      offsetsFrom(
        BigInt64Array.from(far, (x) => base + x),
        0,
        far.length,
        base,
        out,
      )
      expect(Array.from(out)).toEqual(far.map(Number))
    }
  })

  it('channels are picked in order, with their full 64 bits', () => {
    const times = BigInt64Array.from([-(2n ** 61n), -1n, 0n, 2n ** 40n + 1n])
    expect(pickChannel(times, Uint16Array.from([2, 1, 2, 2]), 2)).toEqual(
      BigInt64Array.from([-(2n ** 61n), 0n, 2n ** 40n + 1n]),
    )
    expect(lowerBound(times, 0n)).toBe(2)
    expect(lowerBound(times, 2n ** 50n)).toBe(4)
  })
})

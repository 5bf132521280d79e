import { describe, expect, it } from 'vitest'
import type { SinglesResult } from '../../server/physics/kinds/singles/definition.ts'
import { closeTo } from './close-to.ts'
import { readExpected, readReferenceTags, recordNames } from './reference-tags.ts'
import { recordOf, runKind } from './run-kind.ts'
import { poissonTimes, seeded } from './seeded.ts'

const singles = (parameters: unknown, record: ReturnType<typeof recordOf>) =>
  runKind<SinglesResult>('singles', parameters, record)

describe('singles of the reference records (reference/tags/expected.json)', () => {
  const expected = readExpected()
  it.each(recordNames)('%s: counts, duration and rates', async (name) => {
    const { result } = await singles({}, readReferenceTags(name))
    expect(result.durationPs).toBe(expected[name].durationPs)
    expect(Object.fromEntries(result.channels.map((c) => [c.channel, c.counts]))).toEqual(
      expected[name].counts,
    )
    for (const c of result.channels) {
      closeTo(c.rate.value, c.counts / (expected[name].durationPs * 1e-12), 1e-12)
      closeTo(c.rate.u, Math.sqrt(c.counts) / (expected[name].durationPs * 1e-12), 1e-12)
      expect(result.trace.counts[c.channel]!.length).toBe(100)
      const inTrace = result.trace.counts[c.channel]!.reduce((a, b) => a + b)
      expect(c.counts - inTrace).toBeLessThanOrEqual(2)
    }
  })
})

describe('singles by hand', () => {
  it('rate, interval, dispersion and trace of a small record', async () => {
    // Bins 3 5 4 6 2 4 7 1 of one second: closed form, definitions.md check 32.
    const counts = [3, 5, 4, 6, 2, 4, 7, 1]
    const tags = counts.flatMap((n, k) =>
      Array.from({ length: n }, (_, i): [number, number] => [k * 1e12 + i * 1e10, 5]),
    )
    const { result } = await singles({ traceBinPs: 1e12 }, recordOf(tags, 8_000_000_000_000n))
    expect(result.trace).toEqual({ startPs: 0, binPs: 1e12, counts: { 5: counts } })
    expect(result.channels[0]!.dispersion).toMatchObject({ value: 1, bins: 8, chi2: 7, dof: 7, binPs: 1e12 })
    closeTo(result.channels[0]!.dispersion!.p, 0.857759715106, 1e-11)
    expect(result.channels[0]!.rate).toEqual({ value: 4, u: Math.sqrt(32) / 8, unit: 'cps' })
    expect(result.channels[0]!.smallestGapPs).toBe(1e10)
    expect(result.channels[0]!.sourceRate).toBeNull()
  })

  it('an empty channel is a result with an upper limit (closed form 1.8410216450/T)', async () => {
    const { result } = await singles(
      { channels: [1, 9] },
      recordOf(
        [
          [0, 1],
          [5e11, 1],
        ],
        1_000_000_000_000n,
      ),
    )
    const empty = result.channels[1]!
    expect(empty).toMatchObject({ channel: 9, counts: 0, dispersion: null, smallestGapPs: null })
    expect(empty.rate).toMatchObject({ value: 0, u: null })
    closeTo(empty.rate.upper, 1.841021645, 1e-10)
    expect(empty.interval68![0]).toBe(0)
    expect(result.trace.counts).toHaveProperty('9')
  })

  it('dead time and dark rate give the source rate, u in quadrature (definitions.md check 5)', async () => {
    const step = 1_000_000
    const tags = Array.from({ length: 100_000 }, (_, i): [number, number] => [i * step, 1])
    const parameters = {
      deadTimes: { 1: { ps: 50_000, kind: 'non-extending' } },
      darkRates: { 1: { value: 631.57895, u: 1000 } },
    }
    const { result, codes } = await singles(parameters, recordOf(tags, 100_000_000_000n))
    closeTo(result.channels[0]!.sourceRate!.value, 1_052_000, 1e-8)
    const u = Math.sqrt(1e5) / 0.1 / 0.95
    closeTo(result.channels[0]!.sourceRate!.u, Math.hypot(u, 1000), 1e-10)
    closeTo(result.channels[0]!.rate.value, 1e6, 1e-12)
    expect(codes).toContain('dead-time')
  })

  it('refuses a dead time that the rate contradicts, at its field', async () => {
    const tags = Array.from({ length: 1000 }, (_, i): [number, number] => [i * 1000, 1])
    const parameters = { deadTimes: { 1: { ps: 400, kind: 'extending' } } }
    await expect(singles(parameters, recordOf(tags))).rejects.toMatchObject({
      code: 'invalid-values',
      errors: [{ pointer: '/parameters/deadTimes/1/ps' }],
    })
  })

  it('refuses a declared duration shorter than the tags, and a record without tags or duration', async () => {
    await expect(
      singles(
        {},
        recordOf(
          [
            [0, 1],
            [100, 1],
          ],
          99n,
        ),
      ),
    ).rejects.toThrow(/shorter/)
    await expect(singles({}, recordOf([]))).rejects.toThrow(/no tags/)
  })

  it('refuses unknown parameters by name', async () => {
    await expect(singles({ traceBin: 5 }, recordOf([[0, 1]]))).rejects.toMatchObject({
      errors: [{ pointer: '/parameters/traceBin' }],
    })
  })

  it('writes picoseconds beyond 2^53 as text and keeps them exact', async () => {
    const far = 2n ** 60n + 1n
    const { result } = await singles(
      {},
      recordOf([
        [0, 1],
        [far, 1],
      ]),
    )
    expect(result.durationPs).toBe(far.toString())
    expect(result.lastPs).toBe(far.toString())
  })
})

describe('quality notes of singles', () => {
  const steady = poissonTimes(seeded(7), 1e-7, 1e11).map((t): [number, number] => [t, 1])

  it('are silent for a steady source', async () => {
    const { codes } = await singles({}, recordOf(steady))
    expect(codes).toEqual([])
  })

  it('tell of drift, a pause, a late channel and a short undeclared record', async () => {
    const falling = steady
      .filter(([t], i) => i % 7 !== 0 || (t as number) < 5e10)
      .filter(([t]) => (t as number) < 5e10 || Number(t) % 2 === 0)
    expect((await singles({}, recordOf(falling))).codes).toContain('rate-drift')
    const paused = steady.filter(([t]) => (t as number) < 3e10 || (t as number) > 4e10)
    expect((await singles({}, recordOf(paused))).codes).toContain('pause')
    const late = [
      ...steady,
      ...steady.filter(([t]) => (t as number) > 2e10).map(([t]): [number | bigint, number] => [t, 2]),
    ]
    expect((await singles({}, recordOf(late))).codes).toContain('channel-span')
    expect((await singles({}, recordOf(steady.slice(0, 500)))).codes).toContain('short-undeclared')
  })
})

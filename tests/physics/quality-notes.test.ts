import { describe, expect, it } from 'vitest'
import {
  alternationNote,
  crosstalkNote,
  wideBinNote,
} from '../../server/physics/kinds/correlation/histogram-notes.ts'
import { recordOf, runKind } from './run-kind.ts'
import { poisson, poissonTimes, seeded } from './seeded.ts'

const codes = (notes: { code: string }[]): string[] => notes.map((n) => n.code)
const flat = (n: number, mean: number, seed: number): number[] => {
  const random = seeded(seed)
  return Array.from({ length: n }, () => poisson(random, mean))
}

describe('notes of a histogram (physics.md section 8)', () => {
  const norm = new Array<number>(201).fill(100)

  it('odd and even bins: told where they differ by a tenth, silent for Poisson counts', () => {
    let told = 0
    for (let seed = 0; seed < 40; seed++) told += alternationNote(flat(201, 100, seed), norm, 100).length
    expect(told).toBe(0)
    const uneven = flat(201, 1000, 1).map((n, i) => Math.round(i % 2 === 0 ? n * 1.05 : n * 0.95))
    expect(codes(alternationNote(uneven, norm, 100))).toEqual(['odd-even-bins'])
  })

  it('crosstalk: peaks at one delay on both sides, not a comb and not one side alone', () => {
    const counts = flat(201, 100, 3)
    expect(crosstalkNote(counts, 100, (k) => k)).toEqual([])
    const both = counts.with(160, 300).with(40, 300)
    expect(codes(crosstalkNote(both, 100, (k) => k))).toEqual(['crosstalk'])
    expect(crosstalkNote(counts.with(160, 300), 100, (k) => k)).toEqual([])
    const comb = counts.map((n, i) => ((i - 100) % 12 === 0 ? 400 : n))
    expect(crosstalkNote(comb, 100, (k) => k)).toEqual([])
  })

  it('a dip of one bin is read too wide, a dip of many is not', () => {
    const dip = (width: number) => norm.map((_, i) => (Math.abs(i - 100) < width ? 0.1 : 1))
    expect(codes(wideBinNote(dip(1), norm, 100, 500))).toEqual(['wide-bin'])
    expect(wideBinNote(dip(4), norm, 100, 500)).toEqual([])
  })
})

describe('notes of correlations and coincidences', () => {
  const random = seeded(5)
  const of = (channel: number, perPs: number, duration: number) =>
    poissonTimes(random, perPs, duration).map((t): [number, number] => [t, channel])
  const steady = recordOf([...of(1, 2e-7, 1e11), ...of(2, 2e-7, 1e11)])
  const parameters = { a: 1, b: 2, binPs: 100_000, halfRangePs: 3_000_000 }

  it('are silent for steady uncorrelated light', async () => {
    expect((await runKind('correlation', parameters, steady)).codes).toEqual([])
    // Half of all uncorrelated runs have fewer pairs than chance: that note says no more.
    const { codes: told } = await runKind('coincidences', { a: 1, b: 2, windowPs: 100_001 }, steady)
    expect(told.filter((code) => code !== 'below-zero')).toEqual([])
  })

  it('block scatter: a common slow change of rate moves g2(0) from block to block', async () => {
    // Coincident bursts in one tenth of the run only.
    const bursts = Array.from({ length: 3000 }, (_, i): [number, number][] => [
      [i * 3e6 + 11, 1],
      [i * 3e6 + 11, 2],
    ]).flat()
    const record = recordOf([...of(1, 2e-7, 1e11), ...of(2, 2e-7, 1e11), ...bursts])
    expect((await runKind('correlation', parameters, record)).codes).toContain('block-scatter')
  })

  it('afterpulses lift the autocorrelation at short lag', async () => {
    const tags = of(1, 1e-7, 1e12).flatMap(([t]): [number, number][] =>
      random() < 0.02
        ? [
            [t, 1],
            [t + 50_000 + Math.floor(random() * 50_000), 1],
          ]
        : [[t, 1]],
    )
    const { codes: told, notes } = await runKind('correlation', { ...parameters, b: 1 }, recordOf(tags))
    expect(told).toContain('afterpulsing')
    expect(told).toContain('same-detector')
    expect(notes.find((n) => n.code === 'afterpulsing')!.detail).toMatch(/1\.9 %|2 %|2\.1 %/)
  })

  it('a window finer than the time stamps, one cut by the response and one that is too wide', async () => {
    const coarse = recordOf(
      Array.from({ length: 400 }, (_, i): [number, number][] => [
        [i * 4000, 1],
        [i * 4000 + 80, 2],
      ]).flat(),
    )
    const { codes: fine } = await runKind(
      'coincidences',
      { a: 1, b: 2, windowPs: 21, responseFwhmPs: 400 },
      coarse,
    )
    expect(fine).toEqual(expect.arrayContaining(['finer-than-resolution', 'narrow-window', 'few-pairs']))
    const { codes: wide } = await runKind('coincidences', { a: 1, b: 2, windowPs: 3001 }, coarse)
    expect(wide).toContain('wide-window')
  })
})

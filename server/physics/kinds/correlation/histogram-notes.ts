import type { Note } from '../../definition.ts'
import { brief } from '../../notes/numbers.ts'

const SIGMAS = 4
const CROSSTALK_SIGMAS = 6
/** More peaks than this are the light's own comb, not crosstalk. */
const MOST_CROSSTALK_PEAKS = 2

/**
 * Odd and even bins differ systematically, as uneven time bins of a tagger make them: the alternating sum of second differences
 * in the outer half of the range, where g2 is smooth, beyond four standard deviations.
 */
export function alternationNote(
  counts: ArrayLike<number>,
  norm: ArrayLike<number>,
  halfBins: number,
): Note[] {
  let sum = 0
  let variance = 0
  for (let i = 1; i + 1 < counts.length; i += 2) {
    if (Math.abs(i - halfBins) < halfBins / 2 + 2) continue
    const sides = (counts[i - 1]! / norm[i - 1]! + counts[i + 1]! / norm[i + 1]!) / 2
    sum += counts[i]! / norm[i]! - sides
    // A neighbour stands in two differences, half in each.
    variance += counts[i]! / norm[i]! ** 2 + counts[i + 1]! / norm[i + 1]! ** 2
  }
  if (!(variance > 0) || Math.abs(sum) < SIGMAS * Math.sqrt(variance)) return []
  return [
    {
      code: 'odd-even-bins',
      detail: `Odd and even bins differ by ${brief(Math.abs(sum) / Math.sqrt(variance))} standard deviations in the outer half of the range: the time bins of the tagger are uneven. A bin of twice the width averages over it.`,
    },
  ]
}

/** Narrow peaks at the same delay on both sides, far from zero: light that one detector emits and the other sees. */
export function crosstalkNote(
  counts: ArrayLike<number>,
  halfBins: number,
  delayAt: (k: number) => number,
): Note[] {
  const peaks: number[] = []
  for (let k = Math.max(6, Math.ceil(halfBins / 10)); k <= halfBins - 5; k++) {
    if (stands(counts, halfBins + k) && stands(counts, halfBins - k)) peaks.push(k)
  }
  if (peaks.length === 0 || peaks.length > MOST_CROSSTALK_PEAKS) return []
  return [
    {
      code: 'crosstalk',
      detail: `Narrow peaks at ${peaks.map((k) => `±${brief(delayAt(k) / 1000)} ns`).join(' and ')}, alike on both sides: optical crosstalk between the detectors is suspected.`,
    },
  ]
}

/** A bin far above the mean of its neighbours two to five bins away. */
function stands(counts: ArrayLike<number>, i: number): boolean {
  let around = 0
  for (let j = 2; j <= 5; j++) around += counts[i - j]! + counts[i + j]!
  const mean = around / 8
  return counts[i]! - mean > CROSSTALK_SIGMAS * Math.sqrt(Math.max(mean, 1) * 1.125)
}

/** Fewer than three bins make up the dip (or what is seen of it): g2(0) then depends on the bin. */
export function wideBinNote(
  g2: readonly (number | null)[],
  counts: ArrayLike<number>,
  halfBins: number,
  binPs: number,
): Note[] {
  const zero = g2[halfBins]
  if (zero === null || zero === undefined || zero > 0.7 || halfBins < 4) return []
  const half = (1 + zero) / 2
  const below = (k: number): boolean => (g2[halfBins + k] ?? 1) < half
  let width = 1
  for (let k = 1; k <= halfBins && below(k); k++) width++
  for (let k = -1; k >= -halfBins && below(k); k--) width++
  const expected = counts[halfBins + halfBins]!
  if (width >= 3 || expected < 10) return []
  return [
    {
      code: 'wide-bin',
      detail: `Only ${width === 1 ? 'one bin' : 'two bins'} of ${binPs} ps ${width === 1 ? 'lies' : 'lie'} below half depth: g2(0) is read from a bin wider than a third of the dip and comes out too high. Choose a narrower bin.`,
    },
  ]
}

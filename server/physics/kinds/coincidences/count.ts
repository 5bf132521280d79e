import { createWindowCount, windowStart, type WindowCount } from '../../kernels/window-count/window-count.ts'
import { forEachPiece } from '../../record/channel.ts'
import type { PooledPairs } from '../../record/pooled.ts'

interface Windows {
  a: number
  b: number
  widthPs: bigint
  centrePs: bigint
  /** M, windows on each side, and their distance s. */
  perSide: number
  stepPs: bigint
}

export interface WindowsCounted {
  pairs: number
  offPeakCounts: number
  /** Every window by ascending delay, the peak among them. */
  windows: { centrePs: bigint; counts: number }[]
}

/** Pairs in the window and in all off-peak windows, summed over the inputs. */
export function countWindows(
  pooled: PooledPairs,
  { a, b, widthPs, centrePs, perSide, stepPs }: Windows,
  progress?: (done: number, of: number) => void,
): WindowsCounted {
  const windows = Array.from(
    { length: 2 * perSide + 1 },
    (_, i): { centrePs: bigint; window: WindowCount } => {
      const centre = centrePs + BigInt(i - perSide) * stepPs
      const loPs = windowStart(centre, widthPs)
      return {
        centrePs: centre,
        window: createWindowCount({ loPs, widthPs, sameChannel: pooled.sameChannel }),
      }
    },
  )
  const total = pooled.inputs.reduce((sum, { input }) => sum + input.record.times.length, 0)
  let before = 0
  for (const { input } of pooled.inputs) {
    forEachPiece(input.record, a, b, (starts, stops, done) => {
      for (const { window } of windows) window.push(starts, stops)
      progress?.(before + done, total)
    })
    for (const { window } of windows) window.cut()
    before += input.record.times.length
  }
  const counted = windows.map(({ centrePs: centre, window }) => ({
    centrePs: centre,
    counts: window.count(),
  }))
  const pairs = counted[perSide]!.counts
  return {
    pairs,
    offPeakCounts: counted.reduce((sum, { counts }) => sum + counts, 0) - pairs,
    windows: counted,
  }
}

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

/** Pairs in the window and in all off-peak windows, summed over the inputs. */
export function countWindows(
  pooled: PooledPairs,
  { a, b, widthPs, centrePs, perSide, stepPs }: Windows,
  progress?: (done: number, of: number) => void,
): { pairs: number; offPeakCounts: number } {
  const at = (k: number): WindowCount =>
    createWindowCount({
      loPs: windowStart(centrePs + BigInt(k) * stepPs, widthPs),
      widthPs,
      sameChannel: pooled.sameChannel,
    })
  const peak = at(0)
  const offPeak: WindowCount[] = []
  for (let k = 1; k <= perSide; k++) offPeak.push(at(-k), at(k))
  const total = pooled.inputs.reduce((sum, { input }) => sum + input.record.times.length, 0)
  let before = 0
  for (const { input } of pooled.inputs) {
    forEachPiece(input.record, a, b, (starts, stops, done) => {
      for (const window of [peak, ...offPeak]) window.push(starts, stops)
      progress?.(before + done, total)
    })
    for (const window of [peak, ...offPeak]) window.cut()
    before += input.record.times.length
  }
  return { pairs: peak.count(), offPeakCounts: offPeak.reduce((sum, window) => sum + window.count(), 0) }
}

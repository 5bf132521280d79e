import type { Figure } from '../../../contract/figure.ts'
import { countBar, domainAbove, inWords } from '../../figure-data.ts'
import type { PulsedResult } from './definition.ts'

/** Area of every peak against its number, with the mean of the side peaks. */
export function figure(result: PulsedResult): Figure | null {
  const { peaks, sideScatter } = result
  const counts = peaks.map((p) => p.counts)
  const bars = counts.map(countBar)
  const high = bars.map(([, end]) => end)
  const outermost = peaks.at(-1)!.m + 0.5
  return {
    title: 'Pulsed correlation',
    description: `Areas of the correlation peaks in windows of ${result.peakWindowPs} ps: g2(0) = ${inWords(result.g2Zero)} from ${peaks.length - 1} side peaks.`,
    x: { label: 'peak', symbol: 'm', unit: '1', scale: 'linear', domain: [-outermost, outermost] },
    panels: [
      {
        y: { label: 'pairs', symbol: 'A', unit: '1', scale: 'linear', domain: domainAbove(0, high) },
        weight: 1,
        series: [
          {
            label: 'pairs',
            mark: 'points',
            role: 'coincidence',
            x: peaks.map((p) => p.m),
            y: counts,
            low: bars.map(([end]) => end),
            high,
          },
        ],
        references: [
          { axis: 'y', at: sideScatter.mean, label: 'mean of the side peaks', style: 'dashed' },
          { axis: 'y', at: sideScatter.mean / 2, label: 'one emitter below', style: 'short-dashed' },
          { axis: 'x', at: 0, label: '', style: 'dotted' },
        ],
        ground: null,
      },
    ],
    table: {
      columns: [
        { name: 'm', unit: '1' },
        { name: 'delay', unit: 'ps' },
        { name: 'pairs', unit: '1' },
      ],
      rows: peaks.map((p) => [p.m, p.delayPs, p.counts]),
    },
  }
}

import type { Figure } from '../../../contract/figure.ts'
import { countBar, domainAbove, inWords, timeUnit } from '../../figure-data.ts'
import type { CoincidencesResult } from './definition.ts'

/** Pairs in the window and in the windows beside it; without off-peak windows there is nothing to draw. */
export function figure(result: CoincidencesResult): Figure | null {
  const { windows } = result
  if (windows.length < 2) return null
  const delays = windows.map((w) => Number(w.delayPs))
  const reach = Math.max(...delays.map(Math.abs))
  const unit = timeUnit(reach)
  const counts = windows.map((w) => w.counts)
  const bars = counts.map(countBar)
  const x = delays.map((d) => d / unit.ps)
  const margin = (x.at(-1)! - x[0]!) / (2 * (x.length - 1))
  const high = bars.map(([, up]) => up)
  return {
    title: 'Coincidences',
    description: `Pairs in windows of ${result.windowPs} ps against delay: W2 = ${inWords(result.rate)} cps, g2 = ${inWords(result.g2)}.`,
    x: {
      label: 'delay of the window',
      symbol: 'c',
      unit: unit.name,
      scale: 'linear',
      domain: [x[0]! - margin, x.at(-1)! + margin],
    },
    panels: [
      {
        y: {
          label: 'pairs',
          symbol: 'N',
          unit: '1',
          scale: 'linear',
          domain: domainAbove(0, high, [result.expectedByProduct]),
        },
        weight: 1,
        series: [
          {
            label: 'pairs',
            mark: 'points',
            role: 'coincidence',
            x,
            y: counts,
            low: bars.map(([low]) => low),
            high,
          },
        ],
        references: [
          { axis: 'y', at: result.expectedByProduct, label: 'product of the rates', style: 'dashed' },
          { axis: 'x', at: Number(result.delayPs) / unit.ps, label: 'window', style: 'dotted' },
        ],
        ground: null,
      },
    ],
    table: {
      columns: [
        { name: 'delay', unit: 'ps' },
        { name: 'pairs', unit: '1' },
      ],
      rows: windows.map((w) => [w.delayPs, w.counts]),
    },
  }
}

import { centreOf, scalesOf } from '../correlation-data.ts'
import { meanOneSided } from '../gaussian-response.ts'
import { tau0Parameter, timeConstant, type FitModel } from '../model.ts'

/** Exponential decay after a start pulse: baseline + amplitude exp(-x/t1) from x = 0 on, in counts per bin. */
export const decay: FitModel = {
  name: 'decay',
  title: 'Exponential decay',
  ofCounts: true,
  parameters: (data) => {
    const scales = scalesOf(data)
    const most = Math.max(1, ...data.counts)
    return [
      { name: 'amplitude', unit: '1', lower: 0, upper: Infinity, scale: most / 10 },
      timeConstant('t1', scales),
      { name: 'baseline', unit: '1', lower: 0, upper: Infinity, scale: most / 1000, physicalBound: 0 },
      tau0Parameter(scales),
    ]
  },
  mean: (from, to, sigma, [amplitude, t1, baseline, tau0]) =>
    baseline! + amplitude! * meanOneSided(from - tau0!, to - tau0!, t1!, sigma),
  starts: (data) => {
    const { range, bin } = scalesOf(data)
    const sorted = data.counts.toSorted()
    const baseline = Math.max(sorted[Math.floor(sorted.length / 10)]!, 0.1)
    const peak = data.counts.indexOf(sorted[sorted.length - 1]!)
    const amplitude = Math.max(sorted[sorted.length - 1]! - baseline, 1)
    let area = 0
    for (let i = peak; i < data.counts.length; i++) area += (data.counts[i]! - baseline) * bin
    const fromArea = Math.min(Math.max(area / amplitude, bin), range)
    return [fromArea, fromArea / 3, fromArea * 3].flatMap((t1) =>
      [-1, -0.5, 0].map((bins) => [amplitude, t1, baseline, centreOf(data, peak) + bins * bin]),
    )
  },
}

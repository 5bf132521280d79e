import type { Figure, FigureSeries } from '../../../contract/figure.ts'
import { domainAbove, inWords, timeUnit } from '../../figure-data.ts'
import type { HeraldedResult } from './definition.ts'

/** Tags of both arms against their delay from a herald, with the centres of the windows. */
export function figure(result: HeraldedResult): Figure | null {
  const delays = result.delays.delaysPs.map(Number)
  const half = Number(result.delays.binPs) / 2
  const unit = timeUnit(Math.max(...delays.map(Math.abs)))
  const edges = [...delays.map((d) => (d - half) / unit.ps), (delays.at(-1)! + half) / unit.ps]
  const arm = (label: string, role: FigureSeries['role'], counts: number[]): FigureSeries => ({
    label,
    mark: 'steps',
    role,
    x: edges,
    y: [...counts, counts.at(-1)!],
    low: null,
    high: null,
  })
  const centre = (at: number | string) => ({
    axis: 'x' as const,
    at: Number(at) / unit.ps,
    label: '',
    style: 'dotted' as const,
  })
  return {
    title: 'Heralded source',
    description: `Tags of arms A and B against their delay from a herald: heralded g2(0) = ${inWords(result.g2)}, efficiencies ${inWords(result.efficiencyA)} and ${inWords(result.efficiencyB)}.`,
    x: {
      label: 'delay from herald',
      symbol: 'τ',
      unit: unit.name,
      scale: 'linear',
      domain: [edges[0]!, edges.at(-1)!],
    },
    panels: [
      {
        y: {
          label: 'tags in a bin',
          symbol: 'n',
          unit: '1',
          scale: 'linear',
          domain: domainAbove(0, result.delays.a, result.delays.b),
        },
        weight: 1,
        series: [arm('arm A', 'channel-1', result.delays.a), arm('arm B', 'channel-2', result.delays.b)],
        references: [centre(result.delayAPs), centre(result.delayBPs)],
        ground: null,
      },
    ],
    table: {
      columns: [
        { name: 'delay', unit: 'ps' },
        { name: 'arm A', unit: '1' },
        { name: 'arm B', unit: '1' },
      ],
      rows: result.delays.delaysPs.map((d, k) => [d, result.delays.a[k]!, result.delays.b[k]!]),
    },
  }
}

import type { Figure, FigureSeries } from '../../../contract/figure.ts'
import { channelRole, domainAbove, inWords, timeUnit } from '../../figure-data.ts'
import type { SinglesResult } from './definition.ts'

/** Rate of every channel against time since the start of the trace. */
export function figure(result: SinglesResult): Figure | null {
  const { trace, channels } = result
  const binPs = Number(trace.binPs)
  const bins = Math.max(0, ...Object.values(trace.counts).map((counts) => counts.length))
  if (bins === 0) return null
  const unit = timeUnit(binPs * bins)
  const inKilo = channels.some(({ rate }) => (rate.value ?? 0) >= 10_000)
  const perCount = 1e12 / binPs / (inKilo ? 1000 : 1)
  const starts = Array.from({ length: bins }, (_, k) => (k * binPs) / unit.ps)
  const series = channels.map(({ channel }, i): FigureSeries => ({
    label: `channel ${channel}`,
    mark: 'steps',
    role: channelRole(i),
    x: [...starts, (bins * binPs) / unit.ps],
    y: [...trace.counts[channel]!, trace.counts[channel]!.at(-1)!].map((n) => n * perCount),
    low: null,
    high: null,
  }))
  return {
    title: 'Singles',
    description: `Rate against time: ${channels.map(({ channel, rate }) => `channel ${channel} ${inWords(rate)} cps`).join(', ')}.`,
    x: {
      label: 'time',
      symbol: 't',
      unit: unit.name,
      scale: 'linear',
      domain: [0, (bins * binPs) / unit.ps],
    },
    panels: [
      {
        y: {
          label: 'rate',
          symbol: 'R',
          unit: inKilo ? 'kcps' : 'cps',
          scale: 'linear',
          domain: domainAbove(0, ...series.map((s) => s.y)),
        },
        weight: 1,
        series,
        references: [],
        ground: null,
      },
    ],
    table: {
      columns: [
        { name: 'start', unit: 'ps' },
        ...channels.map(({ channel }) => ({ name: `counts channel ${channel}`, unit: '1' })),
      ],
      rows: starts.map((_, k) => [
        (BigInt(trace.startPs) + BigInt(k) * BigInt(trace.binPs)).toString(),
        ...channels.map(({ channel }) => trace.counts[channel]![k] ?? null),
      ]),
    },
  }
}

import type { Figure } from '../../server/contract/figure.ts'

/** Uniform numbers from a seed (a linear congruential generator, constants of Numerical Recipes): the same every run. */
function seeded(seed: number): () => number {
  let state = seed
  return () => {
    state = (1664525 * state + 1013904223) % 4294967296
    return state / 4294967296
  }
}

/**
 * A correlation figure made for the tests and the gallery: 1 - 0.92 exp(-|τ|/3.45) with noise of about 0.04, its curve
 * with a band, and residuals in σ. Nothing measured.
 */
export function sampleFigure(points = 81): Figure {
  const random = seeded(7)
  const gauss = () => Array.from({ length: 12 }, random).reduce((sum, each) => sum + each, -6)
  const x = Array.from({ length: points }, (_, at) => -20 + (40 * at) / (points - 1))
  const curve = (at: number) => 0.99 - 0.92 * Math.exp(-Math.abs(at) / 3.45)
  const u = x.map((at) => 0.04 * Math.sqrt(Math.max(0.1, curve(at))))
  const y = x.map((at, index) => curve(at) + u[index]! * gauss())
  const residual = y.map((value, index) => (value - curve(x[index]!)) / u[index]!)
  const fine = Array.from({ length: 401 }, (_, at) => -20 + at / 10)
  const counts = y.map((value) => Math.round(500 * value))
  const axis = (label: string, symbol: string | null, unit: string) => ({
    label,
    symbol,
    unit,
    scale: 'linear' as const,
    domain: null,
  })
  return {
    title: 'Second-order correlation',
    description:
      'Second-order correlation against delay from −20 to 20 ns with fit; value at zero delay 0.070.',
    x: axis('delay', 'τ', 'ns'),
    panels: [
      {
        y: { ...axis('', 'g^(2)(τ)', '1'), domain: [0, 1.25] },
        weight: 4,
        series: [
          {
            label: 'two sigma of the fit',
            mark: 'band',
            role: 'fit',
            x: fine,
            y: fine.map(curve),
            low: fine.map((at) => curve(at) - 0.016),
            high: fine.map((at) => curve(at) + 0.016),
          },
          {
            label: 'measured',
            mark: 'points',
            role: 'coincidence',
            x,
            y,
            low: y.map((value, at) => value - u[at]!),
            high: y.map((value, at) => value + u[at]!),
          },
          { label: 'fit', mark: 'line', role: 'fit', x: fine, y: fine.map(curve), low: null, high: null },
        ],
        references: [
          { axis: 'y', at: 1, label: '', style: 'dashed' },
          { axis: 'y', at: 0.5, label: 'one-emitter limit 0.5', style: 'short-dashed' },
          { axis: 'x', at: 0, label: '', style: 'dotted' },
        ],
        ground: null,
      },
      {
        y: { ...axis('residual', null, 'σ'), domain: [-4, 4] },
        weight: 1,
        series: [
          { label: 'residual', mark: 'stems', role: 'coincidence', x, y: residual, low: null, high: null },
        ],
        references: [{ axis: 'y', at: 0, label: '', style: 'dashed' }],
        ground: [-2, 2],
      },
    ],
    table: {
      columns: [
        { name: 'delay', unit: 'ns' },
        { name: 'g2', unit: '1' },
        { name: 'u', unit: '1' },
        { name: 'counts', unit: '1' },
      ],
      rows: x.map((at, index) => [at, y[index]!, u[index]!, counts[index]!]),
    },
  }
}

/** Singles rates of two channels over ten minutes, for lines with markers. */
export function ratesFigure(): Figure {
  const random = seeded(3)
  const x = Array.from({ length: 121 }, (_, at) => at * 5)
  const rate = (level: number) =>
    x.map((at) => level + (random() - 0.5) * 0.7 - (Math.abs(at - 210) < 10 ? 1 : 0))
  const one = rate(41.3)
  const two = rate(38.9)
  const linear = 'linear' as const
  return {
    title: 'Singles rates',
    description: 'Singles rates of D1 and D2 over 600 s, steady to one per cent.',
    x: { label: 'time', symbol: null, unit: 's', scale: linear, domain: [0, 600] },
    panels: [
      {
        y: { label: '', symbol: 'W_1', unit: 'kcps', scale: linear, domain: [36, 44] },
        weight: 1,
        series: [
          { label: 'D1', mark: 'line', role: 'channel-1', x, y: one, low: null, high: null },
          { label: 'D2', mark: 'line', role: 'channel-2', x, y: two, low: null, high: null },
        ],
        references: [],
        ground: null,
      },
    ],
    table: {
      columns: [
        { name: 'time', unit: 's' },
        { name: 'D1', unit: 'kcps' },
        { name: 'D2', unit: 'kcps' },
      ],
      rows: x.map((at, index) => [at, one[index]!, two[index]!]),
    },
  }
}

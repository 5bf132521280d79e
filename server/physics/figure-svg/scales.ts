import { scaleLinear, scaleLog, type ScaleContinuousNumeric } from 'd3-scale'
import type { FigureAxis } from '../../contract/figure.ts'

export type Scale = ScaleContinuousNumeric<number, number>

/** Scale of an axis onto [from, to] pixels; an axis without a domain gets that of its numbers. */
export function scaleOf(axis: FigureAxis, numbers: number[], from: number, to: number): Scale {
  const domain = axis.domain ?? extent(numbers, axis.scale)
  const scale = axis.scale === 'log' ? scaleLog() : scaleLinear()
  return scale.domain(domain).range([from, to])
}

function extent(numbers: number[], scale: FigureAxis['scale']): [number, number] {
  let low = Infinity
  let high = -Infinity
  for (const x of numbers) {
    if (!Number.isFinite(x) || (scale === 'log' && x <= 0)) continue
    low = Math.min(low, x)
    high = Math.max(high, x)
  }
  if (low > high) return scale === 'log' ? [1, 10] : [0, 1]
  return low === high ? [low - (scale === 'log' ? low / 2 : 0.5), high + 0.5] : [low, high]
}

export interface Ticks {
  major: { at: number; label: string }[]
  minor: number[]
}

/** Thin spaces in thousands from five digits on, where d3 puts commas. */
function spaced(label: string): string {
  const plain = label.replaceAll(',', '')
  return plain.replace(
    /^(−?)(\d{5,})/,
    (_, minus: string, digits: string) => minus + digits.replace(/(?<=\d)(?=(\d{3})+$)/g, '\u2009'),
  )
}

/** About `count` labelled ticks, and unlabelled ones between them. */
export function ticksOf(scale: Scale, count: number): Ticks {
  const format = scale.tickFormat(count)
  const major = scale.ticks(count).map((at) => ({ at, label: spaced(format(at)) }))
  const known = new Set(major.map(({ at }) => at))
  return {
    major: major.filter(({ label }) => label !== ''),
    minor: scale.ticks(count * 5).filter((at) => !known.has(at)),
  }
}

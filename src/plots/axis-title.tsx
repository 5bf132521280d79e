import type { ReactNode } from 'react'
import type { FigureAxis } from '../../server/contract/figure.ts'
import { letterRuns, symbolParts } from '../ui/symbol.tsx'

/** "delay τ / ns" in words, for labels and tables. */
export function axisWords(axis: FigureAxis): string {
  const unit = axis.unit && axis.unit !== '1' ? ` / ${axis.unit}` : ''
  const log = axis.scale === 'log' ? ', logarithmic' : ''
  return [axis.label, axis.symbol].filter(Boolean).join(' ') + unit + log
}

/** The same as SVG text: symbol in the italic of the text face, indices raised and lowered. */
export function AxisTitle({ axis, symbolOnly }: { axis: FigureAxis; symbolOnly?: boolean }) {
  const unit = axis.unit && axis.unit !== '1' ? ` / ${axis.unit}` : ''
  const label = symbolOnly && axis.symbol ? '' : axis.label + (axis.label && axis.symbol ? ' ' : '')
  return (
    <>
      {label}
      {axis.symbol && symbolSpans(axis.symbol)}
      <tspan>{unit}</tspan>
      {axis.scale === 'log' && <tspan>, logarithmic</tspan>}
    </>
  )
}

const shifts = { base: 0, sub: 3, sup: -4 }

function symbolSpans(symbol: string): ReactNode[] {
  let level = 0
  return symbolParts(symbol).flatMap((part, at) => {
    const shift = shifts[part.level]
    const runs = part.level === 'base' ? letterRuns(part.text) : [{ text: part.text, italic: false }]
    return runs.map((run, each) => {
      const dy = shift - level
      level = shift
      return (
        <tspan
          key={`${at}-${each}`}
          dy={dy || undefined}
          fontSize={part.level === 'base' ? undefined : 9}
          className={run.italic ? 'hs-var' : undefined}
        >
          {run.text}
        </tspan>
      )
    })
  })
}

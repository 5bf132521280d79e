import type { ReactNode } from 'react'
import { Symbol } from './symbol.tsx'

export type QuantityProps = {
  /** The texts that the record prints, rounded already: this part only sets them. A hyphen is shown as a minus sign. */
  value: string
  /** Standard uncertainty; null where none exists. */
  u?: string | null
  /** "1" and "" show no unit. */
  unit?: string
}

/** ASCII figures as they are set: a true minus sign, thin spaces in thousands from five digits of the integer part. */
export function setFigure(text: string): string {
  const [, sign = '', whole = '', rest = ''] = /^([-−]?)(\d*)(.*)$/su.exec(text) ?? []
  const grouped = whole.length >= 5 ? whole.replace(/\B(?=(\d{3})+$)/g, '\u2009') : whole
  return (sign && '−') + grouped + rest.replace(/-/g, '−')
}

const hasUnit = (unit?: string): unit is string => Boolean(unit) && unit !== '1'

/** Value ± uncertainty and unit, in the figure face. */
export function Quantity({ value, u, unit }: QuantityProps) {
  return (
    <span className="hs-fig">
      {setFigure(value)}
      {u && ` ± ${setFigure(u)}`}
      {hasUnit(unit) && <span className="hs-unit"> {unit}</span>}
    </span>
  )
}

/** The key result of a block, large: symbol = value ± u unit. A stale one is struck through and says so to the ear. */
export function KeyResult({
  symbol,
  value,
  u,
  unit,
  stale,
}: QuantityProps & { symbol: ReactNode; stale?: boolean }) {
  return (
    <span className="hs-key" data-stale={stale ? '' : undefined}>
      {stale && <span className="hs-only-spoken">Out of date: </span>}
      <span className="hs-quantity-name">
        {typeof symbol === 'string' ? <Symbol>{symbol}</Symbol> : symbol}
      </span>
      {` = ${setFigure(value)}`}
      {u && <span className="hs-uncertainty">{` ± ${setFigure(u)}`}</span>}
      {hasUnit(unit) && <span className="hs-unit"> {unit}</span>}
    </span>
  )
}

/** A further result beside the key one: words or a symbol, then the figure. */
export function OtherResult({ name, ...quantity }: QuantityProps & { name: ReactNode }) {
  return (
    <span className="hs-result-other">
      {name} <Quantity {...quantity} />
    </span>
  )
}

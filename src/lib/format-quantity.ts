import type { FigureText } from '../../server/contract/calculations.ts'
import { shownText, typographic } from '../../server/contract/quantity-text.ts'

const thinSpace = '\u2009'
const narrowNoBreakSpace = '\u202f'

/** A reported figure without unit, as the record shows it: 0.083 ± 0.011. */
export function figureWithoutUnit(figure: Pick<FigureText, 'value' | 'u'>): string {
  return typographic(figure.value, figure.u)
}

/** The unit as printed after a number: none for pure numbers. */
export function unitText(unit: string | null): string {
  return unit === null || unit === '1' ? '' : unit
}

/** A reported figure with its unit: 3.45 ± 0.13 ns. */
export function figureInFull(figure: Pick<FigureText, 'value' | 'u' | 'unit'>): string {
  const unit = unitText(figure.unit)
  return figureWithoutUnit(figure) + (unit && ` ${unit}`)
}

/** An integer with thin spaces in thousands. */
export function countText(count: number): string {
  return shownText(count, null).replaceAll(thinSpace, narrowNoBreakSpace)
}

/** Large counts in words: 48.1 M. */
export function roughCount(count: number): string {
  const step = [
    { from: 999.5e6, divisor: 1e9, letter: 'G' },
    { from: 999.5e3, divisor: 1e6, letter: 'M' },
    { from: 1e4, divisor: 1e3, letter: 'k' },
  ].find(({ from }) => count >= from)
  return step ? `${(count / step.divisor).toPrecision(3)} ${step.letter}` : countText(count)
}

const steps = ['B', 'kB', 'MB', 'GB', 'TB']

/** Size in powers of 1000: 385 MB. */
export function sizeText(bytes: number): string {
  let step = 0
  let size = bytes
  while (size >= 999.5 && step < steps.length - 1) {
    size /= 1000
    step += 1
  }
  return `${step === 0 ? size : size.toPrecision(3)} ${steps[step]}`
}

/** Seconds to wait in words: 4 s, 2 min 10 s, 1 h 5 min. */
export function waitText(seconds: number): string {
  const whole = Math.max(0, Math.round(seconds))
  if (whole < 60) return `${whole} s`
  if (whole < 3600)
    return whole % 60 === 0 ? `${whole / 60} min` : `${Math.floor(whole / 60)} min ${whole % 60} s`
  return `${Math.floor(whole / 3600)} h ${Math.round((whole % 3600) / 60)} min`
}

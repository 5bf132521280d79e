/*
 * Times are kept in whole picoseconds, beyond 2^53 as text. People read and write them with the unit that suits.
 */
const units = [
  { unit: 'ps', ps: 1 },
  { unit: 'ns', ps: 1e3 },
  { unit: 'µs', ps: 1e6 },
  { unit: 'ms', ps: 1e9 },
  { unit: 's', ps: 1e12 },
] as const

export type TimeUnit = (typeof units)[number]['unit']

/** Number of picoseconds in a unit. */
export function picosecondsIn(unit: TimeUnit): number {
  return units.find((each) => each.unit === unit)?.ps ?? 1
}

/** The largest unit in which a time is at least 1. Below 1 ns: ps. */
export function suitableUnit(ps: number): TimeUnit {
  return [...units].reverse().find((each) => Math.abs(ps) >= each.ps)?.unit ?? 'ps'
}

/** A time with a unit that suits, up to four digits: 600 s, 2 ns, 500 ps. */
export function durationText(ps: number | string): string {
  const value = Number(ps)
  const unit = suitableUnit(value)
  return `${Number((value / picosecondsIn(unit)).toPrecision(4))} ${unit}`
}

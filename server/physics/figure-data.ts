import type { Figure, FigureSeries } from '../contract/figure.ts'
import type { Quantity } from '../contract/quantity.ts'
import { garwoodInterval } from './special/garwood.ts'

/** A unit of delay or time in which numbers stay short, and how many ps it has. */
export interface TimeUnit {
  name: 'ps' | 'ns' | 'µs' | 'ms' | 's'
  ps: number
}

const UNITS: TimeUnit[] = [
  { name: 's', ps: 1e12 },
  { name: 'ms', ps: 1e9 },
  { name: 'µs', ps: 1e6 },
  { name: 'ns', ps: 1e3 },
  { name: 'ps', ps: 1 },
]

/** The largest unit of which the range holds at least two. */
export function timeUnit(rangePs: number): TimeUnit {
  return UNITS.find(({ ps }) => rangePs >= 2 * ps) ?? UNITS[UNITS.length - 1]!
}

/** Channel hues and patterns go by position, four of them; more channels begin again. */
export function channelRole(position: number): FigureSeries['role'] {
  return (['channel-1', 'channel-2', 'channel-3', 'channel-4'] as const)[position % 4]!
}

/** A domain from `floor` to a little above the largest number of the lists. */
export function domainAbove(floor: number, ...lists: (readonly (number | null)[])[]): [number, number] {
  let most = floor
  for (const list of lists) for (const x of list) if (x !== null && x > most) most = x
  return [floor, most === floor ? floor + 1 : floor + (most - floor) * 1.06]
}

/** From this count on an error bar is symmetric, sqrt(n); below it is the Garwood interval (look.md section 6). */
export const SYMMETRIC_FROM = 10

/** Ends of the error bar of a count. */
export function countBar(n: number): [number, number] {
  return n < SYMMETRIC_FROM ? garwoodInterval(n) : [n - Math.sqrt(n), n + Math.sqrt(n)]
}

/** "0.083 ± 0.011" for a sentence: u to two digits, value to the same place; six digits where there is no u. */
export function inWords({ value, u, upper }: Quantity): string {
  if (value === null) return 'not defined'
  if (u === null || u === 0)
    return upper === undefined
      ? String(Number(value.toPrecision(6)))
      : `below ${Number(upper.toPrecision(3))}`
  const places = 1 - Math.floor(Math.log10(u))
  const shown = (x: number): string =>
    places >= 0 ? x.toFixed(Math.min(places, 20)) : String(Math.round(x / 10 ** -places) * 10 ** -places)
  return `${shown(value).replace('-', '−')} ± ${shown(u)}`
}

export type FigureTable = Figure['table']

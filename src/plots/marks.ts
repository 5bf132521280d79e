import type { FigureSeries } from '../../server/contract/figure.ts'

export type Role = FigureSeries['role']

/** The outline of one marker about the origin, for a path: form first, hue second. */
const outlines: Record<Role, (size: number) => string> = {
  'channel-1': circle,
  'channel-2': (size) => square(size * 0.9),
  'channel-3': (size) => `m0 ${-1.1 * size}l${1.1 * size} ${2 * size}h${-2.2 * size}Z`,
  'channel-4': (size) =>
    `m0 ${-1.25 * size}l${1.25 * size} ${1.25 * size}l${-1.25 * size} ${1.25 * size}l${-1.25 * size} ${-1.25 * size}Z`,
  coincidence: circle,
  accidental: (size) => square(size * 0.8),
  fit: circle,
}

function circle(size: number): string {
  return `m${-size} 0a${size} ${size} 0 1 0 ${2 * size} 0a${size} ${size} 0 1 0 ${-2 * size} 0Z`
}

function square(size: number): string {
  return `m${-size} ${-size}h${2 * size}v${2 * size}h${-2 * size}Z`
}

const round = (value: number) => Math.round(value * 100) / 100

/** All markers of a series in one path. */
export function marksPath(role: Role, points: { x: number; y: number }[], size: number): string {
  const outline = outlines[role](size)
  return points.map((point) => `M${round(point.x)} ${round(point.y)}${outline}`).join('')
}

/** Open markers are filled with the paper, so that a line behind them does not cross them. */
export function isOpen(role: Role): boolean {
  return role !== 'channel-1' && role !== 'channel-3'
}

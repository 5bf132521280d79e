import type { DelimitedOptions } from './options.ts'

/** What a column is by its name. Names are common practice in laboratories, in English. */
export interface ColumnRole {
  role: 'time' | 'channel' | 'delay' | 'counts' | 'g2' | 'unknown'
  /** Unit in the name, lower case, `us` for µs. */
  unit: string | null
}

const roleNames: Record<Exclude<ColumnRole['role'], 'unknown'>, string[]> = {
  time: [
    'time',
    'times',
    'timestamp',
    'time stamp',
    'timetag',
    'time tag',
    'tag time',
    't',
    'arrival time',
    'detection time',
    'event time',
    'tag',
    'tick',
    'ticks',
  ],
  channel: [
    'channel',
    'chan',
    'ch',
    'channel id',
    'channel number',
    'channel no',
    'detector',
    'det',
    'detector id',
    'input',
  ],
  delay: ['delay', 'tau', 'τ', 'lag', 'time difference', 'delta t', 'dt'],
  counts: ['counts', 'count', 'coincidences', 'coincidence', 'n', 'histogram', 'events'],
  g2: ['g2', 'g(2)', 'g2(tau)', 'g²'],
}

const unitForm = /^(.*?)(?:[\s_/-]+|\s*[([]\s*)(ps|ns|us|µs|μs|ms|s|ticks?)\s*[)\]]?$/

/** Reads role and unit from a column name such as `time_ps`, `Timestamp (ns)`, `t [µs]`, `ticks`. */
export function roleOf(name: string): ColumnRole {
  const lower = name.trim().toLowerCase()
  const [, base = lower, unitText] = unitForm.exec(lower) ?? []
  const plain = base
    .replace(/[\s_-]+/g, ' ')
    .replace(/\.$/, '')
    .trim()
  const found = Object.entries(roleNames).find(
    ([, names]) => names.includes(plain) || names.includes(plain.replace(/s$/, '')),
  )
  const role = (found?.[0] ?? 'unknown') as ColumnRole['role']
  if (unitText === undefined) return { role, unit: /^ticks?$/.test(plain) ? 'ticks' : null }
  return { role, unit: unitText.replace(/^[µμ]/, 'u').replace(/^tick$/, 'ticks') }
}

/** True for a delay column with counts or g2 beside it. */
export function isHistogram(names: string[]): boolean {
  const roles = names.map((name) => roleOf(name).role)
  return roles.includes('delay') && (roles.includes('counts') || roles.includes('g2'))
}

/** Options for a time unit by its name; ms and s are ticks of that length. Null for ticks of unknown length. */
export function unitOptions(
  unit: string,
  tickPs: string | null,
): Pick<DelimitedOptions, 'unit' | 'tickPs'> | null {
  if (unit === 'ps' || unit === 'ns' || unit === 'us') return { unit }
  if (unit === 'ms') return { unit: 'ticks', tickPs: '1000000000' }
  if (unit === 's') return { unit: 'ticks', tickPs: '1000000000000' }
  return tickPs === null ? null : { unit: 'ticks', tickPs }
}

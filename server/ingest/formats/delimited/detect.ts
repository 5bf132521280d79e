import { headBytes } from '../../reading.ts'
import { declaredTick } from './comments.ts'
import { isNumber, layoutOf, type Layout } from './layout.ts'
import type { DelimitedOptions } from './options.ts'
import { roleOf, unitOptions } from './roles.ts'

export type Detected = { options: DelimitedOptions; doubts: string[] } | { unreadable: string }

/**
 * Recognises a delimited file from its beginning: a tag record by the names of its columns or, without names, by their
 * values; else a table. Null for text that holds no rows of numbers.
 */
export function detectDelimited(head: Uint8Array): Detected | null {
  const layout = layoutOf(head, head.length < headBytes, {})
  if (layout === null || !holdsRows(layout)) return null
  return layout.named ? byNames(layout) : byValues(layout)
}

/** Most lines are rows with a number in them; a header with a time and a channel is enough by itself. */
function holdsRows({ rows, names, delimiter, named }: Layout): boolean {
  if (named && tagColumns(names) !== null) return true
  const fitting = rows.filter(
    (row) => row.length === names.length && row.some((field) => isNumber(field, delimiter)),
  )
  return rows.length > 0 && fitting.length >= 0.8 * rows.length
}

const found = (layout: Layout, columns: Partial<DelimitedOptions>): DelimitedOptions => ({
  ...columns,
  delimiter: layout.delimiter,
  // Names from a comment line are found again only when the header is left open.
  ...(layout.named && !layout.hasHeader ? {} : { header: layout.hasHeader }),
})

interface TagColumns {
  time: string
  channel: string
  unit: string | null
  /** One column alone can be the time and one the channel. */
  unique: boolean
}

function tagColumns(names: string[]): TagColumns | null {
  const roles = names.map((name) => ({ name, ...roleOf(name) }))
  const times = roles.filter(({ role }) => role === 'time')
  const channels = roles.filter(({ role }) => role === 'channel')
  const [time, channel] = [times[0], channels[0]]
  if (!time || !channel || roles.some(({ role }) => role === 'counts')) return null
  return {
    time: time.name,
    channel: channel.name,
    unit: time.unit,
    unique: times.length + channels.length === 2,
  }
}

function byNames(layout: Layout): Detected {
  const columns = tagColumns(layout.names)
  if (columns === null) return { options: found(layout, {}), doubts: [] }
  const { time, channel, unit, unique } = columns
  const stated = unitOptions(
    unit ?? unitByValues(layout, layout.names.indexOf(time)),
    declaredTick(layout.comments),
  )
  if (stated === null) {
    return {
      unreadable:
        `The times in column ${time} are in ticks and the file does not say how long a tick is. ` +
        'The file is safe; set the reading with tickPs, the length of a tick in ps.',
    }
  }
  const doubts = [
    ...(unit === null ? [unitDoubt(stated.unit!)] : []),
    ...(unique
      ? []
      : [`Several columns could be the time or the channel: ${time} and ${channel} were taken.`]),
  ]
  return { options: found(layout, { time, channel, ...stated }), doubts }
}

const unitDoubt = (unit: string) => `The file does not say the unit of the times: ${unit} was assumed.`

/** Unit of times that nothing states: whole numbers are taken for ps, others for ns. */
function unitByValues({ rows }: Layout, column: number): string {
  return rows.every((row) => /^[+-]?\d+$/.test(row[column] ?? '')) ? 'ps' : 'ns'
}

/** A list of settings (angles, positions) does not reach this, times in ps or ns soon do. */
const smallestLastTime = 1e5

const isChannelLike = (values: number[]) =>
  values.every((v) => Number.isInteger(v) && v >= 0 && v <= 255) && new Set(values).size <= 64

/** Large, mostly ascending and not on a regular grid, which a delay or a time axis would be. */
function isTimeLike(values: number[]): boolean {
  if (Math.max(...values) < smallestLastTime) return false
  const steps = values.slice(1).map((v, i) => v - values[i]!)
  const ascending = steps.filter((step) => step >= 0).length
  return ascending >= 0.8 * steps.length && new Set(steps.map((s) => s.toPrecision(9))).size > 1
}

/** Without names: the one column of small whole numbers is the channel, the one ascending column of others the time. */
function byValues(layout: Layout): Detected {
  const columns = layout.names.map((_, at) =>
    layout.rows.map((row) => Number((row[at] ?? '').replace(',', '.'))),
  )
  const numeric = columns.map((values) => values.every(Number.isFinite))
  const channels = columns.flatMap((values, at) => (numeric[at] && isChannelLike(values) ? [at] : []))
  const times = columns.flatMap((values, at) =>
    numeric[at] && !channels.includes(at) && isTimeLike(values) ? [at] : [],
  )
  const [time, channel] = [times[0], channels[0]]
  if (columns.length !== 2 || time === undefined || channel === undefined) {
    return { options: found(layout, {}), doubts: ['The columns have no names in the file.'] }
  }
  const named = { time: layout.names[time]!, channel: layout.names[channel]! }
  const unit = unitOptions(unitByValues(layout, time), null)!
  const guess = `The columns have no names: ${named.time} was taken for the time and ${named.channel} for the channel.`
  return { options: found(layout, { ...named, ...unit }), doubts: [guess, unitDoubt(unit.unit!)] }
}

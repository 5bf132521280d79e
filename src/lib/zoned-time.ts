/*
 * Times typed by a person in the laboratory's zone, as text: the browser's own picker would be white in a dark room.
 */
const pattern = /^(\d{4})-(\d{2})-(\d{2})[ T](\d{2}):(\d{2})(?::(\d{2}))?$/

/** Minutes that a zone is ahead of UTC at an instant. */
function offsetMinutes(instant: number, zone: string): number {
  const parts = new Intl.DateTimeFormat('en-GB', {
    timeZone: zone,
    hourCycle: 'h23',
    year: 'numeric',
    month: '2-digit',
    day: '2-digit',
    hour: '2-digit',
    minute: '2-digit',
    second: '2-digit',
  }).formatToParts(instant)
  const part = (type: string) => Number(parts.find((each) => each.type === type)?.value)
  const wall = Date.UTC(
    part('year'),
    part('month') - 1,
    part('day'),
    part('hour'),
    part('minute'),
    part('second'),
  )
  return Math.round((wall - Math.floor(instant / 1000) * 1000) / 60_000)
}

/** "2026-11-12 11:30:05" in a zone as UTC with milliseconds; null when it is no such time. */
export function utcOfZoned(text: string, zone: string): string | null {
  const found = pattern.exec(text.trim())
  if (!found) return null
  const [, year, month, day, hour, minute, second] = found.map(Number)
  const wall = Date.UTC(year ?? 0, (month ?? 1) - 1, day, hour, minute, Number.isNaN(second) ? 0 : second)
  if (
    !new Date(wall).toISOString().startsWith(text.trim().slice(0, 10)) ||
    (hour ?? 0) > 23 ||
    (minute ?? 0) > 59
  )
    return null
  // The offset is looked up twice, since the first guess may stand on the other side of a change of clocks.
  const guess = wall - offsetMinutes(wall, zone) * 60_000
  return new Date(wall - offsetMinutes(guess, zone) * 60_000).toISOString()
}

/** A UTC time as text in a zone: "2026-11-12 11:30:05". */
export function zonedOfUtc(iso: string, zone: string): string {
  const instant = Date.parse(iso)
  return new Date(instant + offsetMinutes(instant, zone) * 60_000)
    .toISOString()
    .slice(0, 19)
    .replace('T', ' ')
}

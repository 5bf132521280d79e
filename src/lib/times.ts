/*
 * Times on screen: 24 h, in the laboratory's zone, which is named once on a screen and not at every time.
 */
let zone = Intl.DateTimeFormat().resolvedOptions().timeZone

/** Sets the zone of all times shown; the session brings it. */
export function setLaboratoryZone(name: string): void {
  zone = name
}

/** Name of the laboratory's zone. */
export function laboratoryZone(): string {
  return zone
}

function format(iso: string | Date, parts: Intl.DateTimeFormatOptions): string {
  return new Intl.DateTimeFormat('en-GB', { timeZone: zone, hourCycle: 'h23', ...parts }).format(
    new Date(iso),
  )
}

const clock = { hour: '2-digit', minute: '2-digit' } as const

/** 14:58 */
export function clockTime(iso: string | Date): string {
  return format(iso, clock)
}

/** 14:58:31 */
export function clockTimeWithSeconds(iso: string | Date): string {
  return format(iso, { ...clock, second: '2-digit' })
}

/** 12 November 2026 */
export function longDate(iso: string | Date): string {
  return format(iso, { day: 'numeric', month: 'long', year: 'numeric' })
}

/** 12 November 2026, 10:56 */
export function dateAndTime(iso: string | Date): string {
  return `${longDate(iso)}, ${clockTime(iso)}`
}

/** 12 Nov 2026, 14:52:03 */
export function stampTime(iso: string | Date): string {
  const date = format(iso, { day: 'numeric', month: 'short', year: 'numeric' })
  return `${date}, ${clockTimeWithSeconds(iso)}`
}

/** The time today, the weekday and time within six days, else the date. */
export function nearTime(iso: string, now = new Date()): string {
  const days = (now.getTime() - new Date(iso).getTime()) / 86_400_000
  if (longDate(iso) === longDate(now)) return clockTime(iso)
  if (days >= 0 && days < 6) return format(iso, { weekday: 'short', ...clock })
  return format(iso, { day: 'numeric', month: 'short', year: 'numeric' })
}

/** How long ago: 5 min, 2 h, 3 d. */
export function age(iso: string, now = new Date()): string {
  const minutes = Math.max(0, Math.floor((now.getTime() - new Date(iso).getTime()) / 60_000))
  if (minutes < 60) return `${minutes} min`
  if (minutes < 48 * 60) return `${Math.floor(minutes / 60)} h`
  return `${Math.floor(minutes / 1440)} d`
}

/** Name of the zone with its offset now: Europe/Berlin, UTC+1. */
export function zoneInWords(now = new Date()): string {
  const parts = new Intl.DateTimeFormat('en-GB', {
    timeZone: zone,
    timeZoneName: 'shortOffset',
  }).formatToParts(now)
  const offset = parts.find((part) => part.type === 'timeZoneName')?.value.replace('GMT', 'UTC') ?? ''
  return zone === 'UTC' ? 'UTC' : `${zone}, ${offset}`
}

import type { Meaning } from '../../contract/signatures.ts'

/** Meanings of signatures as they are printed; never merged into one word. */
export const meaningWords: Record<Meaning, string> = {
  authorship: 'Signed as author',
  'witness-read': 'Witnessed: read and understood',
  'witness-present': 'Witnessed: was present and saw the measurement',
}

/** 12 November 2026, 16:20:31 UTC+01:00 (Europe/Berlin): time and zone of a signature, complete without any other line. */
export function zonedTime(time: string, zone: string): string {
  const parts = new Intl.DateTimeFormat('en-GB', {
    timeZone: zone,
    day: 'numeric',
    month: 'long',
    year: 'numeric',
    hour: '2-digit',
    minute: '2-digit',
    second: '2-digit',
    timeZoneName: 'longOffset',
  }).formatToParts(new Date(time))
  const part = (type: Intl.DateTimeFormatPartTypes) => parts.find((item) => item.type === type)?.value ?? ''
  const offset = part('timeZoneName').replace('GMT', 'UTC')
  return `${part('day')} ${part('month')} ${part('year')}, ${part('hour')}:${part('minute')}:${part('second')} ${offset} (${zone})`
}

/** Bytes in decimal units, the exact number beside them where it differs. */
export function sizeWords(bytes: string): string {
  const n = Number(bytes)
  const exact = `${bytes.replace(/\B(?=(\d{3})+$)/g, '\u2009')} B`
  if (n < 10_000) return exact
  const unit = n < 1e6 ? 1e3 : n < 1e9 ? 1e6 : 1e9
  return `${(n / unit).toPrecision(3)} ${unit === 1e3 ? 'kB' : unit === 1e6 ? 'MB' : 'GB'} (${exact})`
}

/** Hex digits in groups of eight. */
export const grouped = (hex: string): string => (hex.match(/.{8}/g) ?? [hex]).join(' ')

/** Picoseconds as text in the largest unit that keeps them readable. */
export function durationWords(ps: string): string {
  const seconds = Number(ps) / 1e12
  return seconds >= 1 ? `${Number(seconds.toPrecision(6))} s` : `${Number((seconds * 1e3).toPrecision(6))} ms`
}

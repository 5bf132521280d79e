/** Calendar date of an instant in a time zone: 2026-03-02. */
export function dateInZone(time: Date, zone: string): string {
  return new Intl.DateTimeFormat('en-CA', {
    timeZone: zone,
    year: 'numeric',
    month: '2-digit',
    day: '2-digit',
  }).format(time)
}

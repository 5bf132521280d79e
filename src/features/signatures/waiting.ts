/** Witnessing is due after 7 days and overdue after 30 (records.md, life of an entry). */
export const dueDays = 7
export const overdueDays = 30

/** Days since a time, fractions included. */
export function daysSince(iso: string, now: Date): number {
  return Math.max(0, (now.getTime() - Date.parse(iso)) / 86_400_000)
}

const numbers = ['No', 'One', 'Two', 'Three', 'Four', 'Five', 'Six', 'Seven', 'Eight', 'Nine', 'Ten']

/** A count at the beginning of a sentence, as a word up to ten. */
function countWord(count: number): string {
  return numbers[count] ?? String(count)
}

/** The sentence over the desk: how many wait and how many are past the limit. */
export function deskSentence(submitted: readonly string[], now: Date): string {
  const waits = submitted.map((iso) => daysSince(iso, now))
  const late = waits.filter((days) => days > dueDays).length
  const overdue = waits.filter((days) => days > overdueDays).length
  if (waits.length === 0) return 'No sheet waits for you.'
  const first = `${countWord(waits.length)} ${waits.length === 1 ? 'sheet waits' : 'sheets wait'} for you`
  if (late === 0) return `${first}, none past the seven-day limit.`
  const past = `${countWord(late).toLowerCase()} past the seven-day limit`
  return overdue === 0
    ? `${first}, ${past}.`
    : `${first}, ${past}, ${countWord(overdue).toLowerCase()} overdue.`
}

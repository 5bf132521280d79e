const narrowNoBreakSpace = '\u202f'

/** A place in the ledger or a count of events, in thousands: 4 812. */
export function eventNumber(sequence: number): string {
  return String(sequence).replace(/\B(?=(\d{3})+$)/g, narrowNoBreakSpace)
}

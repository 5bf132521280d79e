import { expect } from 'vitest'

/** Demands agreement to a relative tolerance; the message shows both numbers in full. */
export function closeTo(actual: number | null | undefined, wanted: number, relative: number): void {
  const allowed = relative * Math.max(Math.abs(wanted), Number.MIN_VALUE)
  const off = Math.abs((actual ?? NaN) - wanted)
  expect(off <= allowed || off === 0, `${actual} should be ${wanted} to ${relative}`).toBe(true)
}

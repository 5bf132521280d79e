import { need } from './report.ts'

/**
 * Throws unless bytes are exactly one DER value (X.690 section 10): definite, shortest lengths, and the parts of every
 * constructed value fill it to the last byte. Parsers forgive more and would show something else than outside tools do.
 */
export function checkDer(der: Uint8Array): void {
  need(checkValue(der, 0, der.length) === der.length, 'not one DER value')
}

/** Checks the value that begins at a byte and must end at or before `end`; answers where it ends. */
function checkValue(der: Uint8Array, at: number, end: number): number {
  const tag = der[at] ?? 0
  need(at + 2 <= end && (tag & 0x1f) !== 0x1f, 'not DER')
  const { start, length } = readLength(der, at + 1, end)
  const stop = start + length
  need(stop <= end, 'not DER: a value is longer than what holds it')
  const isConstructed = (tag & 0x20) !== 0
  let inner = start
  while (isConstructed && inner < stop) inner = checkValue(der, inner, stop)
  return stop
}

function readLength(der: Uint8Array, at: number, end: number): { start: number; length: number } {
  const first = der[at] ?? 0
  if (first < 0x80) return { start: at + 1, length: first }
  const count = first & 0x7f
  need(count >= 1 && count <= 4 && at + 1 + count <= end, 'not DER: an indefinite or unreadable length')
  const length = der.subarray(at + 1, at + 1 + count).reduce((n, byte) => n * 256 + byte, 0)
  need(length >= (count === 1 ? 0x80 : 256 ** (count - 1)), 'not DER: a length is not in its shortest form')
  return { start: at + 1 + count, length }
}

import type { Decimal } from '../../decimal.ts'

const limitHigh = 2 ** 29 // 2^61 = 2^29 × 2^32

const plus = 0x2b
const minus = 0x2d
const point = 0x2e

/** Digits that a double holds whatever they are. */
const safeDigits = 15

/**
 * Reads times by hand from bytes, without a BigInt or a rounding: numbers that are whole picoseconds as they stand.
 * What it does not take (exponents, digits below a picosecond, fractions of ticks) goes the exact, slower way.
 */
export class TagNumberReader {
  /** Halves of the 64-bit two's complement of the time read last. */
  high = 0
  low = 0
  /** Picoseconds in 10^-f of a unit, for f decimal places; all whole. */
  private readonly factors: number[] = []

  constructor(
    unit: Decimal,
    /** Byte that may stand for the decimal point beside the point itself. */
    private readonly decimalComma: number,
  ) {
    let { digits } = unit
    const isWholeUnit = unit.scale <= 0 && digits > 0n && digits <= 10n ** 12n
    while (isWholeUnit) {
      this.factors.push(Number(digits))
      if (digits % 10n !== 0n) break
      digits /= 10n
    }
  }

  /** Reads the time that begins at `start`. Returns where it ends, or -1 when it must be read the exact way. */
  read(bytes: Uint8Array, start: number, end: number): number {
    let at = start
    const sign = bytes[at]
    if (sign === plus || sign === minus) at++
    let head = 0
    let tail = 0
    let tailPower = 1
    let digits = 0
    let places = -1
    for (; at < end; at++) {
      const byte = bytes[at]!
      const digit = byte - 0x30
      if (digit >= 0 && digit <= 9) {
        if (digits < safeDigits) head = head * 10 + digit
        else {
          tail = tail * 10 + digit
          tailPower *= 10
        }
        digits++
        if (places >= 0) places++
      } else if (places < 0 && (byte === point || byte === this.decimalComma)) places = 0
      else break
    }
    const factor = this.factors[Math.max(places, 0)]
    if (digits === 0 || digits > 19 || factor === undefined) return -1
    const fits =
      digits <= safeDigits ? this.store(head * factor) : factor === 1 && this.storeLong(head, tail, tailPower)
    if (!fits) return -1
    if (sign === minus) this.negate()
    return at
  }

  private store(value: number): boolean {
    if (value > Number.MAX_SAFE_INTEGER) return false
    this.high = Math.floor(value / 2 ** 32)
    this.low = value - this.high * 2 ** 32
    return true
  }

  /** head × tailPower + tail, of 16 to 19 digits, in halves: every step stays below 2^53. */
  private storeLong(head: number, tail: number, tailPower: number): boolean {
    const headHigh = Math.floor(head / 2 ** 32)
    const low = (head - headHigh * 2 ** 32) * tailPower + tail
    const carry = Math.floor(low / 2 ** 32)
    this.high = headHigh * tailPower + carry
    this.low = low - carry * 2 ** 32
    return this.high < limitHigh || (this.high === limitHigh && this.low === 0)
  }

  private negate(): void {
    this.high = this.low === 0 ? -this.high : -this.high - 1
    this.low = this.low === 0 ? 0 : 2 ** 32 - this.low
  }
}

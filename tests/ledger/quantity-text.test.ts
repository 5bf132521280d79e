import { describe, expect, it } from 'vitest'
import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { figureText, shownText, typographic } from '../../server/contract/quantity-text.ts'

type Pair = [value: number, u: number | null, text: string, uText: string | null, shown: string]

/** Written by another implementation of the rule (Python decimals), boundary values and random ones. */
const pairs = JSON.parse(
  readFileSync(join(import.meta.dirname, 'quantity-text-pairs.json'), 'utf8'),
) as Pair[]

describe('figure text', () => {
  it('agrees with another implementation on every pair', () => {
    const ours = pairs.map(([value, u]) => {
      const text = figureText(value, u)
      return [value, u, text.value, text.u, shownText(value, u)]
    })
    expect(ours).toEqual(pairs)
    expect(pairs.length).toBeGreaterThan(1500)
  })

  // Rows of the rounding rule itself (shapes 1, "Numbers"), worked by hand.
  it.each([
    [20, 0.542247606419, '20.00', '0.54'],
    [0.12345, 0.0995, '0.12', '0.10'],
    [-0.0004, 0.5, '0.00', '0.50'],
    [0.25, 1, '0.3', '1.0'],
    [2.5, 10, '3', '10'],
    [45678, 1234, '45700', '1200'],
    [12345678, null, '12345678', null],
    [999999999.7, null, '1000000000', null],
    [1e-6, null, '0.000001', null],
    [1e-7, null, '1e-7', null],
    [0, 1e-9, '0.0000000000', '0.0000000010'],
    [9.9996e9, 1e7, '1.0000e10', '0.0010e10'],
    [5, 3e9, '0.0e9', '3.0e9'],
    [-0.5, 0, '-0.5', '0'],
  ])('%d with u %d', (value, u, text, uText) => {
    expect(figureText(value, u)).toEqual({ value: text, u: uText })
  })

  it('refuses what is no quantity', () => {
    expect(() => figureText(Number.NaN, null)).toThrow(RangeError)
    expect(() => figureText(1, -0.1)).toThrow(RangeError)
    expect(() => figureText(1, Number.POSITIVE_INFINITY)).toThrow(RangeError)
  })
})

describe('typographic text', () => {
  it.each([
    ['1200', null, '1200'],
    ['-45700', '1200', '\u221245\u2009700 ± 1200'],
    ['12345678', null, '12\u2009345\u2009678'],
    ['2.50e-8', '0.10e-8', '(2.50 ± 0.10) × 10⁻⁸'],
    ['-2.5e10', null, '\u22122.5 × 10¹⁰'],
    ['0.123456780', '0.000000010', '0.123456780 ± 0.000000010'],
  ])('%s with u %s', (value, u, shown) => {
    expect(typographic(value, u)).toBe(shown)
  })
})

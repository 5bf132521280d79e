// @vitest-environment jsdom
import { cleanup, render, screen } from '@testing-library/react'
import { afterEach, describe, expect, it } from 'vitest'
import { fringeHalves } from '../../src/ui/fringe-geometry.ts'
import { FringeMark } from '../../src/ui/fringe-mark.tsx'

afterEach(cleanup)

// Centres, radii and widths read off the drawings of these two digests in the design's mock-ups (look/mock: review.html
// and ledger.html), which were made by the designer's own program.
const seal = 'ab643d187ab82fbed558e70424c968e6df0e7a0a1513acd03d72bfb4e2db1218'
const head = '0f47f0495da90d8cd6cea4d1a36b586a3ae88d9d4fbe207a28152cdeebb6d65d'

const rounded = (value: number) => Math.round(value * 100) / 100

describe('fringe mark', () => {
  it('draws the straight and the bowed half of a digest as the design does', () => {
    const { upper, lower } = fringeHalves(seal)
    expect(upper.darkGround).toBe(true)
    expect([upper.centre.x, upper.centre.y].map(rounded)).toEqual([-484.01, 764.32])
    expect(upper.fringes.map((each) => rounded(each.radius))).toEqual([
      846.27, 852.47, 858.67, 864.87, 871.07, 877.27, 883.47, 889.67, 895.87, 902.07, 908.27, 914.47, 920.67,
      926.87, 933.07, 939.27, 945.47, 951.67, 957.87,
    ])
    const thin = 1.49
    const thick = 3.47
    expect(upper.fringes.map((each) => rounded(each.width))).toEqual([
      ...[thin, thin, thin, thick, thick, thick, thin, thick, thick, thick],
      ...[thick, thick, thin, thick, thin, thin, thin, thin, thin],
    ])
    expect(lower.darkGround).toBe(true)
    expect([lower.centre.x, lower.centre.y].map(rounded)).toEqual([45.33, 51.96])
    expect(lower.fringes.map((each) => rounded(each.radius))).toEqual([
      9.6, 19.2, 28.8, 38.4, 48, 57.6, 67.2, 76.8, 86.4, 96, 105.6, 115.2,
    ])
    expect(lower.fringes.slice(0, 5).map((each) => rounded(each.width))).toEqual([2.3, 2.3, 2.3, 5.38, 5.38])
  })

  it('draws rings about the middle of a half, and a light ground', () => {
    const { upper, lower } = fringeHalves(head)
    expect(upper.centre).toEqual({ x: 16, y: 16 })
    expect(upper.fringes).toHaveLength(19)
    expect(upper.fringes.slice(0, 4).map((each) => [rounded(each.radius), rounded(each.width)])).toEqual([
      [3.95, 4.42],
      [11.85, 1.9],
      [19.75, 1.9],
      [27.65, 4.42],
    ])
    expect(lower.darkGround).toBe(false)
    expect([lower.centre.x, lower.centre.y].map(rounded)).toEqual([-468.01, 780.32])
  })

  it('takes the other side when the lowest bit of the eighth byte is set', () => {
    const other = fringeHalves('ab643d187ab82fbf' + seal.slice(16)).upper
    expect([other.centre.x, other.centre.y].map(rounded)).toEqual([516.01, -732.32])
  })

  it('names the first eight digits and draws every fringe', () => {
    render(<FringeMark sha256={seal} size={52} />)
    const mark = screen.getByRole('img', { name: 'Fringe mark for ab643d18' })
    expect(mark.getAttribute('width')).toBe('52')
    expect(mark.querySelectorAll('circle')).toHaveLength(19 + 12)
  })

  it('refuses what is not a SHA-256', () => {
    expect(() => fringeHalves('ab64')).toThrow(/64 hexadecimal digits/)
  })
})

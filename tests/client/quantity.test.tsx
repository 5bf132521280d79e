// @vitest-environment jsdom
import { cleanup, render } from '@testing-library/react'
import { afterEach, describe, expect, it } from 'vitest'
import { KeyResult, Quantity, setFigure } from '../../src/ui/quantity.tsx'
import { Symbol, symbolParts } from '../../src/ui/symbol.tsx'

afterEach(cleanup)

const text = (node: React.ReactElement) => render(node).container.textContent

describe('quantity', () => {
  it('sets value, uncertainty and unit with the signs of print', () => {
    expect(text(<Quantity value="-12.40" u="0.05" unit="µm" />)).toBe('−12.40 ± 0.05 µm')
  })

  it('leaves out what there is none of', () => {
    expect(text(<Quantity value="0.083" u={null} unit="1" />)).toBe('0.083')
  })

  // ISO 80000-1, 7.3.1: groups of three are separated by a thin space; four digits may stay together.
  it.each([
    ['1234', '1234'],
    ['41283', '41\u2009283'],
    ['24769800.5', '24\u2009769\u2009800.5'],
    ['-41283', '−41\u2009283'],
    ['1.2e-7', '1.2e−7'],
  ])('groups %s', (plain, set) => {
    expect(setFigure(plain)).toBe(set)
  })

  it('says in words that a struck key result is out of date', () => {
    const { container } = render(<KeyResult symbol="g^(2)(0)" value="0.083" u="0.011" stale />)
    expect(container.textContent).toContain('Out of date: g(2)(0) = 0.083 ± 0.011')
    expect(container.querySelector('.hs-key')?.hasAttribute('data-stale')).toBe(true)
  })
})

describe('symbol', () => {
  it('raises, lowers, and sets letters alone in italic', () => {
    expect(symbolParts('g_{H}^{(2)}(0)')).toEqual([
      { text: 'g', level: 'base' },
      { text: 'H', level: 'sub' },
      { text: '(2)', level: 'sup' },
      { text: '(0)', level: 'base' },
    ])
    const { container } = render(<Symbol>g^(2)(τ)</Symbol>)
    expect(container.querySelector('sup')?.textContent).toBe('(2)')
    expect([...container.querySelectorAll('i')].map((each) => each.textContent)).toEqual(['g', 'τ'])
  })
})

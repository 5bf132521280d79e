// @vitest-environment jsdom
import { cleanup, fireEvent, render, screen, within } from '@testing-library/react'
import { afterEach, describe, expect, it, vi } from 'vitest'
import { BeamPath, type BeamNode } from '../../src/plots/beam-path/beam-path.tsx'
import { tall } from '../../src/plots/beam-path/tall-variants.ts'
import { wide, type BeamVariant, type NodeId } from '../../src/plots/beam-path/variants.ts'

afterEach(cleanup)

const nodes: Partial<Record<NodeId, BeamNode>> = {
  extra: { label: 'Accidentals', figure: '3.213', more: '± 0.001 cps' },
  source: { label: 'Source RPL-QD-31b', figure: '915.3 nm', more: 'cw' },
  'detector-1': {
    label: 'D1 Heron, W',
    sub: '1',
    figure: '41 283',
    more: '± 8 cps',
    fault: 'Above the safe rate.',
  },
}

describe('beam path', () => {
  it('has a list twin in path order, whatever the order of the figures given', () => {
    render(<BeamPath variant="hbt" nodes={nodes} label="Beam path of R-0612, frozen at 11:30" />)
    const list = screen.getByRole('list', { name: 'Beam path of R-0612, frozen at 11:30' })
    expect(
      within(list)
        .getAllByRole('listitem')
        .map((each) => each.textContent),
    ).toEqual([
      'Source RPL-QD-31b: 915.3 nm cw',
      'D1 Heron, W1: 41 283 ± 8 cps. Above the safe rate.',
      'Accidentals: 3.213 ± 0.001 cps',
    ])
  })

  it('opens a node by pointer and by keyboard, and is no button where nothing opens', () => {
    const onNode = vi.fn()
    const { rerender } = render(<BeamPath variant="hbt" nodes={nodes} label="Beam path" onNode={onNode} />)
    const [node] = screen.getAllByRole('button', { name: 'Accidentals: 3.213 ± 0.001 cps' })
    fireEvent.click(node!)
    fireEvent.keyDown(node!, { key: 'Enter' })
    fireEvent.keyDown(node!, { key: 'x' })
    expect(onNode.mock.calls).toEqual([['extra'], ['extra']])
    rerender(<BeamPath variant="hbt" nodes={nodes} label="Beam path" />)
    expect(screen.queryAllByRole('button')).toHaveLength(0)
  })

  it('says and shows that there is no light: shutter in place of the neutral density, light beyond it marked', () => {
    const { container } = render(<BeamPath variant="hbt" nodes={{}} label="Beam path" state="no-light" />)
    const drawing = container.querySelector('.hs-beam-wide')!
    const lights = [...drawing.querySelectorAll('.hs-light')]
    expect(lights.map((each) => each.hasAttribute('data-after-shutter'))).toEqual([false, true, true])
    expect(lights[0]!.getAttribute('d')).toBe('M73 72L240 72')
    expect(screen.getByRole('listitem').textContent).toMatch(/shutter is closed/)
  })

  const variants = Object.keys(wide) as BeamVariant[]
  it.each(variants)('%s: everything lies inside its drawing, wide and tall', (variant) => {
    for (const drawing of [wide[variant], tall[variant]]) {
      const [width, height] = drawing.size
      const points = [
        ...drawing.wires.flat(),
        ...drawing.lights.flatMap((light) => light.points),
        ...drawing.parts.map((part) => part.at),
        ...drawing.slots.map((slot) => slot.at),
      ]
      for (const [x, y] of points) {
        expect(x).toBeGreaterThan(0)
        expect(x).toBeLessThan(width)
        expect(y).toBeGreaterThan(0)
        expect(y).toBeLessThan(height)
      }
    }
  })

  it.each(variants)(
    '%s: the phone shows the same places for words, no row closer than a finger needs',
    (variant) => {
      expect(tall[variant].slots.map((slot) => slot.id)).toEqual(wide[variant].slots.map((slot) => slot.id))
      const rows = tall[variant].slots.map((slot) => slot.at[1])
      // 44 px: WCAG 2.5.5 target size.
      for (let at = 1; at < rows.length; at++) expect(rows[at]! - rows[at - 1]!).toBeGreaterThanOrEqual(44)
    },
  )
})

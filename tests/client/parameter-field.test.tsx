// @vitest-environment jsdom
import { cleanup, render, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { useState } from 'react'
import { afterEach, describe, expect, it, vi } from 'vitest'
import { ParameterChoice, ParameterField } from '../../src/ui/parameter-field.tsx'

afterEach(cleanup)

function Bin({ onCommit }: { onCommit: (value: string) => void }) {
  const [value, setValue] = useState('2.0')
  return (
    <ParameterField
      label="Window"
      unit="ns"
      value={value}
      check={(text) => (Number(text) > 0 ? null : 'A window must be above 0 ns.')}
      onCommit={(now) => {
        setValue(now)
        onCommit(now)
      }}
    />
  )
}

function set() {
  const onCommit = vi.fn()
  render(<Bin onCommit={onCommit} />)
  return { onCommit, field: screen.getByLabelText<HTMLInputElement>('Window'), user: userEvent.setup() }
}

describe('parameter field', () => {
  it('commits on Enter, once', async () => {
    const { onCommit, field, user } = set()
    await user.clear(field)
    await user.type(field, ' 4.0{Enter}')
    await user.tab()
    expect(onCommit.mock.calls).toEqual([['4.0']])
    expect(field.value).toBe('4.0')
  })

  it('restores on Esc and commits nothing', async () => {
    const { onCommit, field, user } = set()
    await user.clear(field)
    await user.type(field, '9{Escape}')
    expect(field.value).toBe('2.0')
    await user.tab()
    expect(onCommit).not.toHaveBeenCalled()
  })

  it('keeps a refused text, says why, and passes nothing on', async () => {
    const { onCommit, field, user } = set()
    await user.clear(field)
    await user.type(field, '-2{Enter}')
    expect(screen.getByRole('alert').textContent).toContain('A window must be above 0 ns.')
    expect(field.value).toBe('-2')
    expect(field.getAttribute('aria-invalid')).toBe('true')
    expect(onCommit).not.toHaveBeenCalled()
  })

  it('commits what was typed when the reader moves on', async () => {
    const { onCommit, field, user } = set()
    await user.clear(field)
    await user.type(field, '3')
    await user.tab()
    expect(onCommit.mock.calls).toEqual([['3']])
  })

  it('commits a choice from its own list, without a native select', async () => {
    const onCommit = vi.fn()
    const choices = [
      { value: 'one', label: 'one emitter' },
      { value: 'two', label: 'two emitters' },
    ]
    const { container } = render(
      <ParameterChoice label="Model" value="one" choices={choices} onCommit={onCommit} />,
    )
    expect(container.querySelector('select')).toBeNull()
    const user = userEvent.setup()
    const box = screen.getByRole('combobox', { name: /Model/ })
    box.focus()
    await user.keyboard('{ArrowDown}')
    await user.click(await screen.findByRole('option', { name: 'two emitters' }))
    expect(onCommit.mock.calls).toEqual([['two']])
  })
})

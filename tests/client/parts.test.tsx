// @vitest-environment jsdom
import { cleanup, fireEvent, render, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { MemoryRouter } from 'react-router-dom'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { initialsOf } from '../../src/ui/initials.tsx'
import { timeLeft } from '../../src/ui/progress.tsx'
import { Rail } from '../../src/ui/rail.tsx'
import { SealLine } from '../../src/ui/seal-line.tsx'
import { ThemeChoice } from '../../src/ui/theme-choice.tsx'
import { useKeys } from '../../src/ui/use-keys.ts'
import { chooseTheme } from '../../src/ui/use-theme.ts'
import { waitingWords } from '../../src/ui/waiting-scale.tsx'

afterEach(cleanup)

describe('theme', () => {
  beforeEach(() => {
    localStorage.clear()
    chooseTheme({ theme: 'day', level: 2 })
  })

  it('sets the page, is kept for the next visit, and shows which one holds', async () => {
    render(<ThemeChoice />)
    await userEvent.click(screen.getByRole('button', { name: 'Dark-room' }))
    expect(document.documentElement.dataset.theme).toBe('darkroom')
    await userEvent.click(screen.getByRole('button', { name: '3' }))
    expect(document.documentElement.dataset.level).toBe('3')
    expect(JSON.parse(localStorage.getItem('halfsilver-theme') ?? '')).toEqual({
      theme: 'darkroom',
      level: 3,
    })
    expect(screen.getByRole('button', { name: 'Dark-room' }).getAttribute('aria-pressed')).toBe('true')
    expect(screen.getByRole('button', { name: 'Day' }).getAttribute('aria-pressed')).toBe('false')
  })

  it('still changes the page when storage is refused', async () => {
    const refuse = vi.spyOn(Storage.prototype, 'setItem').mockImplementation(() => {
      throw new DOMException('refused', 'QuotaExceededError')
    })
    render(<ThemeChoice />)
    await userEvent.click(screen.getByRole('button', { name: 'Dusk' }))
    expect(document.documentElement.dataset.theme).toBe('dusk')
    refuse.mockRestore()
  })
})

describe('rail', () => {
  it('marks the current place and says what its count counts', () => {
    const items = [
      { to: '/bench', label: 'Bench', icon: 'bench' as const, current: true },
      { to: '/desk', label: 'Desk', icon: 'eye' as const, current: false, count: 3, countLabel: '3 waiting' },
    ]
    render(
      <MemoryRouter>
        <Rail brand="Halfsilver" home="/" items={items} />
      </MemoryRouter>,
    )
    const current = screen.getAllByRole('link', { name: 'Bench' })
    expect(current.map((each) => each.getAttribute('aria-current'))).toEqual(['page', 'page'])
    expect(screen.getByLabelText('3 waiting').textContent).toBe('3')
  })
})

describe('seal line', () => {
  it('is an ordered list with one current step, and stations to come say so', () => {
    render(
      <SealLine
        label="Seal line"
        stations={[
          { name: 'Signed', state: 'done', drawing: 'signature', lines: ['Maren Adeyemi'] },
          {
            name: 'Sealed',
            state: 'todo',
            drawing: 'full',
            lines: ['nothing can change afterwards'],
            current: true,
          },
        ]}
      />,
    )
    expect(screen.getByRole('list', { name: 'Seal line' }).tagName).toBe('OL')
    const [done, todo] = screen.getAllByRole('listitem')
    expect(done?.hasAttribute('aria-current')).toBe(false)
    expect(todo?.getAttribute('aria-current')).toBe('step')
    expect(todo?.textContent).toContain('still to come')
  })
})

describe('keys', () => {
  function Page({ acts, single }: { acts: Record<string, () => void>; single?: boolean }) {
    useKeys(acts, { single })
    return <input aria-label="Find" />
  }

  it('takes single keys, pairs and ctrl, but not while the reader types', async () => {
    const acts = { e: vi.fn(), 'g b': vi.fn(), 'ctrl k': vi.fn() }
    render(<Page acts={acts} />)
    await userEvent.keyboard('e')
    await userEvent.keyboard('gb')
    await userEvent.keyboard('{Control>}k{/Control}')
    expect([acts.e, acts['g b'], acts['ctrl k']].map((each) => each.mock.calls.length)).toEqual([1, 1, 1])
    await userEvent.type(screen.getByLabelText('Find'), 'e')
    expect(acts.e).toHaveBeenCalledTimes(1)
  })

  it('leaves single letters alone when they are turned off', () => {
    const acts = { e: vi.fn(), 'ctrl k': vi.fn() }
    render(<Page acts={acts} single={false} />)
    fireEvent.keyDown(document.body, { key: 'e' })
    fireEvent.keyDown(document.body, { key: 'k', ctrlKey: true })
    expect(acts.e).not.toHaveBeenCalled()
    expect(acts['ctrl k']).toHaveBeenCalledTimes(1)
  })
})

describe('words', () => {
  it.each([
    [0.02, '1 hour'],
    [0.3, '7 hours'],
    [1, '1 day'],
    [7, '7 days'],
    [7.5, '7 days, just over'],
    [9.2, '9 days, 2 over'],
  ])('%d days waited: %s', (waited, words) => {
    expect(waitingWords(waited, 7)).toBe(words)
  })

  it.each([
    ['Maren Adeyemi', 'MA'],
    ['Dr Farid Shirvani', 'FS'],
    ['Noor', 'N'],
  ])('%s is %s', (name, initials) => {
    expect(initialsOf(name)).toBe(initials)
  })

  it.each([
    [30, 70, 1, 'about 40 s left'],
    [0, 600, 1, 'about 10 min left'],
    [0, 100, 0, null],
    [100, 100, 5, null],
  ])('%d of %d at %d a second: %s', (done, total, rate, words) => {
    expect(timeLeft(done, total, rate)).toBe(words)
  })
})

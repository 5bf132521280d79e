// @vitest-environment jsdom
import { cleanup, render, screen, waitFor } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { useState } from 'react'
import { afterEach, describe, expect, it, vi } from 'vitest'
import { Button } from '../../src/ui/button.tsx'
import { Dialog } from '../../src/ui/dialog.tsx'
import { PassphraseField } from '../../src/ui/field.tsx'
import { UiRoot } from '../../src/ui/ui-root.tsx'

afterEach(cleanup)

function Page({ onAct, locked }: { onAct: () => void; locked?: boolean }) {
  const [open, setOpen] = useState(false)
  return (
    <UiRoot>
      <Button onClick={() => setOpen(true)}>Countersign</Button>
      <Dialog
        open={open}
        onClose={() => setOpen(false)}
        title="Countersign N-07/042"
        locked={locked}
        actions={
          <>
            <Button kind="primary" onClick={onAct}>
              Countersign and seal
            </Button>
            <Button onClick={() => setOpen(false)}>Keep reading</Button>
          </>
        }
      >
        <PassphraseField label="Signing passphrase" />
      </Dialog>
    </UiRoot>
  )
}

async function opened(locked = false) {
  const onAct = vi.fn()
  const user = userEvent.setup()
  render(<Page onAct={onAct} locked={locked} />)
  await user.click(screen.getByRole('button', { name: 'Countersign' }))
  await screen.findByRole('dialog', { name: 'Countersign N-07/042' })
  return { user, onAct }
}

describe('dialog', () => {
  it('puts the focus into its first field, and what lies behind is out of reach', async () => {
    await opened()
    await waitFor(() => expect(document.activeElement).toBe(screen.getByLabelText('Signing passphrase')))
    // The trap itself needs layout, which jsdom has not: tests/e2e walks it. Here: only the dialog can be found.
    expect(screen.queryByRole('button', { name: 'Countersign' })).toBeNull()
    expect(screen.getByRole('button', { name: 'Countersign and seal' })).toBeTruthy()
  })

  it('closes on Esc without the act, and gives the focus back', async () => {
    const { user, onAct } = await opened()
    await user.keyboard('{Escape}')
    await waitFor(() => expect(screen.queryByRole('dialog')).toBeNull())
    expect(onAct).not.toHaveBeenCalled()
    await waitFor(() =>
      expect(document.activeElement).toBe(screen.getByRole('button', { name: 'Countersign' })),
    )
  })

  it('stays while an act runs', async () => {
    const { user } = await opened(true)
    await user.keyboard('{Escape}')
    expect(screen.queryByRole('dialog')).not.toBeNull()
  })

  it('takes a pasted passphrase, hidden until it is asked for', async () => {
    const { user } = await opened()
    const field = screen.getByLabelText<HTMLInputElement>('Signing passphrase')
    await user.click(field)
    await user.paste('six plain words in a row')
    expect(field.value).toBe('six plain words in a row')
    expect(field.type).toBe('password')
    await user.click(screen.getByRole('button', { name: 'Show' }))
    expect(field.type).toBe('text')
  })

  it('writes no style element, which the content security policy would refuse', async () => {
    await opened()
    expect(document.querySelectorAll('body style')).toHaveLength(0)
  })
})

describe('button', () => {
  it('does not act while disabled, and its reason is read with it', async () => {
    const onClick = vi.fn()
    render(
      <Button disabledReason="You are named as an author." onClick={onClick}>
        Countersign
      </Button>,
    )
    const button = screen.getByRole('button', { name: 'Countersign' })
    await userEvent.click(button)
    expect(onClick).not.toHaveBeenCalled()
    expect(button.getAttribute('aria-disabled')).toBe('true')
    const reason = document.getElementById(button.getAttribute('aria-describedby') ?? '')
    expect(reason?.textContent).toBe('You are named as an author.')
  })
})

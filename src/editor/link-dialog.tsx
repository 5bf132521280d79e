import type { Editor } from '@tiptap/react'
import { useState, type FormEvent } from 'react'
import { isAllowedHref } from '../../server/document/allowed-href.ts'
import { Button } from '../ui/button.tsx'
import { Dialog } from '../ui/dialog.tsx'
import { TextField } from '../ui/field.tsx'

/** Asks where the selected words lead; without a selection the address itself becomes the words. */
export function LinkDialog({ editor, onClose }: { editor: Editor; onClose: () => void }) {
  const before = (editor.getAttributes('link').href as string | undefined) ?? ''
  const [address, setAddress] = useState(before)
  const [wrong, setWrong] = useState(false)

  function submit(event: FormEvent) {
    event.preventDefault()
    const href = completed(address.trim())
    if (!isAllowedHref(href)) return setWrong(true)
    const chain = editor.chain().focus().extendMarkRange('link')
    if (editor.state.selection.empty && before === '') {
      chain.insertContent({ type: 'text', text: href, marks: [{ type: 'link', attrs: { href } }] }).run()
    } else {
      chain.setMark('link', { href }).run()
    }
    onClose()
  }

  function remove() {
    editor.chain().focus().extendMarkRange('link').unsetMark('link').run()
    onClose()
  }

  return (
    <Dialog open onClose={onClose} title="Link">
      <form className="hs-form" onSubmit={submit}>
        <TextField
          label="Address"
          value={address}
          placeholder="https://"
          error={
            wrong ? 'Links lead to http, https or mailto addresses, or to an entry of this laboratory.' : null
          }
          onChange={(event) => setAddress(event.target.value)}
        />
        <div className="hs-actions">
          <Button kind="primary" type="submit">
            Link
          </Button>
          {before !== '' && <Button onClick={remove}>Remove the link</Button>}
          <Button kind="quiet" onClick={onClose}>
            Leave it
          </Button>
        </div>
      </form>
    </Dialog>
  )
}

/** An address as people type it; one of this program becomes a place of its own. */
function completed(address: string): string {
  if (address.startsWith(location.origin)) return address.slice(location.origin.length)
  if (/^[\w.-]+@[\w.-]+\.\w+$/.test(address)) return `mailto:${address}`
  return /^[\w-]+(\.[\w-]+)+([/?#].*)?$/.test(address) ? `https://${address}` : address
}

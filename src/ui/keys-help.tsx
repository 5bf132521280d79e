import { Button } from './button.tsx'
import { Checkbox } from './checkbox.tsx'
import { Dialog } from './dialog.tsx'

export type KeyHelp = { keys: string[]; what: string }

/** The list of keys behind "?". Single letters can be turned off, as speech input may type them. */
export function KeysHelp({
  open,
  onClose,
  keys,
  single,
  onSingle,
}: {
  open: boolean
  onClose: () => void
  keys: KeyHelp[]
  /** Whether single-letter keys are on. */
  single: boolean
  onSingle: (on: boolean) => void
}) {
  return (
    <Dialog open={open} onClose={onClose} title="Keys" actions={<Button onClick={onClose}>Close</Button>}>
      <dl className="hs-keys">
        {keys.map((each) => (
          <KeyRow key={each.what} {...each} />
        ))}
      </dl>
      <div className="hs-dialog-part">
        <Checkbox label="Single-letter keys" checked={single} onChange={onSingle} />
      </div>
    </Dialog>
  )
}

function KeyRow({ keys, what }: KeyHelp) {
  return (
    <>
      <dt>
        {keys.map((key, at) => (
          <span key={key}>
            {at > 0 && ' '}
            <kbd>{key}</kbd>
          </span>
        ))}
      </dt>
      <dd>{what}</dd>
    </>
  )
}

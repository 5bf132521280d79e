import { Button } from '../../ui/button.tsx'
import { Dialog } from '../../ui/dialog.tsx'

/** A link out of the program opens a window, which may be bright: it is named and asked about first. */
export function OutsideLink({ href, onClose }: { href: string | null; onClose: () => void }) {
  return (
    <Dialog
      open={href !== null}
      onClose={onClose}
      title="A page outside this notebook"
      about={
        <>
          <span className="hs-fig">{href}</span> opens in a window of its own, in its own colours.
        </>
      }
      actions={
        <>
          <Button
            kind="primary"
            onClick={() => {
              if (href) window.open(href, '_blank', 'noopener,noreferrer')
              onClose()
            }}
          >
            Open
          </Button>
          <Button onClick={onClose}>Stay here</Button>
        </>
      }
    />
  )
}

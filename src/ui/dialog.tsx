import { Dialog as BaseDialog } from '@base-ui/react/dialog'
import type { ReactNode, RefObject } from 'react'
import { classNames } from './class-names.ts'

type DialogProps = {
  open: boolean
  /** Esc, a press beside the dialog and its harmless button all end here; nothing may be lost or done by it. */
  onClose: () => void
  title: ReactNode
  about?: ReactNode
  children?: ReactNode
  /** Buttons: the act first, the harmless choice after it. */
  actions?: ReactNode
  wide?: boolean
  /** Where the focus goes first; without it, to the first field or button. */
  initialFocus?: RefObject<HTMLElement | null>
  /** While an act runs, Esc and presses beside do nothing. */
  locked?: boolean
}

/** A bevelled sheet before a scrim. Focus is held inside and goes back where it came from. */
export function Dialog({
  open,
  onClose,
  title,
  about,
  children,
  actions,
  wide,
  initialFocus,
  locked,
}: DialogProps) {
  return (
    <BaseDialog.Root
      open={open}
      onOpenChange={(now, details) => {
        if (now) return
        if (locked) details.cancel()
        else onClose()
      }}
    >
      <BaseDialog.Portal>
        <BaseDialog.Backdrop className="hs-scrim" />
        <BaseDialog.Popup
          className={classNames('hs-dialog', wide && 'hs-dialog-wide')}
          initialFocus={initialFocus}
        >
          <BaseDialog.Title>{title}</BaseDialog.Title>
          {about && <BaseDialog.Description className="hs-dialog-about">{about}</BaseDialog.Description>}
          {children}
          {actions && <div className="hs-actions">{actions}</div>}
        </BaseDialog.Popup>
      </BaseDialog.Portal>
    </BaseDialog.Root>
  )
}

/** A part of a dialog under a hair rule. */
export function DialogPart({ children }: { children: ReactNode }) {
  return <div className="hs-dialog-part">{children}</div>
}

import type { ReactNode } from 'react'
import { StateGlyph, type StateName } from './state-glyph.tsx'

export type MessageKind = 'plain' | 'good' | 'warn' | 'fault'

const glyphs: Record<MessageKind, StateName | null> = {
  plain: null,
  good: 'ok',
  warn: 'note',
  fault: 'fault',
}

/**
 * What happened, what is safe, what to do. The ground tells the kind, a glyph and the words carry it; the code, if any,
 * comes last, for the lab manager. A fault is announced at once, the rest when the reader pauses.
 */
export function Message({
  kind = 'plain',
  title,
  children,
  code,
  actions,
}: {
  kind?: MessageKind
  title?: ReactNode
  children?: ReactNode
  code?: string
  actions?: ReactNode
}) {
  const glyph = glyphs[kind]
  return (
    <div className="hs-message" data-kind={kind} role={kind === 'fault' ? 'alert' : 'status'}>
      {glyph && <StateGlyph state={glyph} wordless />}
      <div>
        {title && <b>{title}</b>} {children}
        {code && <span className="hs-message-code">Code {code}, for the lab manager.</span>}
      </div>
      {actions && <div className="hs-actions">{actions}</div>}
    </div>
  )
}

import type { ReactNode } from 'react'
import { Icon, type IconName } from '../ui/icon.tsx'
import { Tip } from '../ui/tip.tsx'

interface ToolProps {
  label: string
  keys?: string
  on?: boolean
  off?: boolean
  run: () => void
  icon?: IconName
  text?: ReactNode
  words?: string
  first?: boolean
}

/** A tool of the toolbar: a sign or a drawing, its name and its key. It leaves the selection of the text alone. */
export function Tool({ label, keys, on, off, run, icon, text, words, first }: ToolProps) {
  return (
    <Tip words={keys ? `${label}, ${keys}` : label}>
      <button
        type="button"
        className="hs-tool"
        aria-label={label}
        aria-pressed={on}
        aria-disabled={off || undefined}
        tabIndex={first ? 0 : -1}
        onMouseDown={(event) => event.preventDefault()}
        onClick={() => !off && run()}
      >
        {icon && <Icon name={icon} size={17} />}
        {text}
        {words && <span className="hs-tool-words">{words}</span>}
      </button>
    </Tip>
  )
}

/** A thin line between groups of tools. */
export const Gap = () => <span className="hs-toolbar-gap" aria-hidden />

import type { CSSProperties, ReactNode } from 'react'
import { StateGlyph } from './state-glyph.tsx'

export type BlockState = 'queued' | 'running' | 'done' | 'stale' | 'failed' | 'sealed'

/**
 * A block in a text with a life of its own: bar, number, title and state; then whatever parts it has. `share` (0 to 1)
 * is how far a running one has come.
 */
export function Block({
  state,
  number,
  title,
  share,
  label,
  children,
}: {
  state: BlockState
  number: string
  title: ReactNode
  share?: number | null
  label: string
  children?: ReactNode
}) {
  const percent = share === null || share === undefined ? null : Math.round(share * 100)
  return (
    <section
      className="hs-block"
      data-state={state}
      aria-label={label}
      style={{ '--hs-done': `${percent ?? 0}%` } as CSSProperties}
    >
      <div className="hs-block-bar" />
      <div className="hs-block-head">
        <span className="hs-block-number">{number}</span>
        <h4>{title}</h4>
        <span className="hs-state" role={state === 'failed' ? 'alert' : 'status'}>
          <StateGlyph state={state}>
            {state === 'running' && percent !== null ? `Running, ${percent} %` : undefined}
          </StateGlyph>
        </span>
      </div>
      {children}
    </section>
  )
}

/** A line of inputs under the head: file, channels, normalisation. */
export function BlockLine({ children }: { children: ReactNode }) {
  return <div className="hs-block-line">{children}</div>
}

/** A row of parameters. */
export function BlockParameters({ children }: { children: ReactNode }) {
  return <div className="hs-parameters">{children}</div>
}

/** A part with the block's own side padding: a plot, a table, a progress bar. */
export function BlockPart({ children }: { children: ReactNode }) {
  return <div className="hs-block-part">{children}</div>
}

/** The key result and what stands beside it. */
export function BlockResult({ children }: { children: ReactNode }) {
  return <div className="hs-result">{children}</div>
}

/** Where a figure comes from, and the acts of the block at the right. */
export function Provenance({ children, actions }: { children: ReactNode; actions?: ReactNode }) {
  return (
    <div className="hs-provenance">
      {children}
      {actions && <span className="hs-provenance-actions">{actions}</span>}
    </div>
  )
}

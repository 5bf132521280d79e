import type { ReactNode } from 'react'

/**
 * What goes here and the first step. The picture (a set-up with its shutter closed) lies on the table above the sheet;
 * put the whole on a ground with holes.
 */
export function EmptyState({
  picture,
  title,
  children,
  templates,
  actions,
}: {
  picture?: ReactNode
  title: string
  children: ReactNode
  templates?: ReactNode
  actions?: ReactNode
}) {
  return (
    <>
      {picture && <div className="hs-empty-picture">{picture}</div>}
      <section className="hs-sheet hs-empty">
        <h1 className="hs-title">{title}</h1>
        <p className="hs-prose">{children}</p>
        {templates && <div className="hs-templates hs-templates-wide hs-empty-part">{templates}</div>}
        {actions && <div className="hs-actions hs-empty-part">{actions}</div>}
      </section>
    </>
  )
}

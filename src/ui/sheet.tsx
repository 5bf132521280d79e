import type { ComponentPropsWithRef, ReactNode } from 'react'
import { classNames } from './class-names.ts'

/** Paper with its bevel. What it holds is up to the caller: columns, or head, strip, body and foot. */
export function Sheet({ className, ...rest }: ComponentPropsWithRef<'article'>) {
  return <article {...rest} className={classNames('hs-sheet', className)} />
}

/** Left the work; right, behind a double rule, what belongs beside it. */
export function Columns({
  children,
  margin,
  label,
}: {
  children: ReactNode
  margin: ReactNode
  label?: string
}) {
  return (
    <div className="hs-columns">
      <div className="hs-main">{children}</div>
      <aside className="hs-margin" aria-label={label ?? 'Beside the work'}>
        {margin}
      </aside>
    </div>
  )
}

/** A headed part of a column, with a count beside the head and a way on at its end. */
export function Section({
  title,
  count,
  end,
  children,
}: {
  title: ReactNode
  count?: ReactNode
  end?: ReactNode
  children: ReactNode
}) {
  return (
    <section className="hs-section">
      <h2 className="hs-section-head">
        {title}
        {count !== undefined && <span className="hs-section-count">{count}</span>}
        {end && <span className="hs-section-end">{end}</span>}
      </h2>
      {children}
    </section>
  )
}

/** Head of a sheet: title in the text face, a line of facts, and a list of facts at the right. */
export function SheetHead({
  title,
  meta,
  facts,
}: {
  title: ReactNode
  meta?: ReactNode[]
  facts?: ReactNode
}) {
  return (
    <header className="hs-sheet-head">
      <div>
        {typeof title === 'string' ? <h1 className="hs-title">{title}</h1> : title}
        {meta && (
          <div className="hs-meta">
            {meta.map((each, at) => (
              <span key={at}>{each}</span>
            ))}
          </div>
        )}
      </div>
      {facts && <div>{facts}</div>}
    </header>
  )
}

/** A strip of the table across the sheet: a set-up is always drawn on it, never on paper. */
export function SheetStrip({
  head,
  end,
  children,
}: {
  head?: ReactNode
  end?: ReactNode
  children: ReactNode
}) {
  return (
    <div className="hs-strip hs-holes">
      {(head || end) && (
        <div className="hs-strip-head">
          {head}
          {end && <span className="hs-strip-end">{end}</span>}
        </div>
      )}
      {children}
    </div>
  )
}

/** The text of a sheet over its margin ground. Give it SheetRows. */
export function SheetBody({ children }: { children: ReactNode }) {
  return <div className="hs-body">{children}</div>
}

/** One part of the text and what hangs beside it; each child of `margin` gets a lead across the rule. */
export function SheetRow({ children, margin }: { children: ReactNode; margin?: ReactNode }) {
  return (
    <div className="hs-row">
      <div className="hs-row-text">{children}</div>
      <div className="hs-row-margin">{margin}</div>
    </div>
  )
}

export function SheetFoot({ children }: { children: ReactNode }) {
  return <footer className="hs-sheet-foot">{children}</footer>
}

/** Short facts, name and value; values in the figure face unless they are words. */
export function Facts({ facts }: { facts: { name: ReactNode; value: ReactNode; words?: boolean }[] }) {
  return (
    <dl className="hs-facts">
      {facts.map((fact, at) => (
        <FactRow key={at} {...fact} />
      ))}
    </dl>
  )
}

function FactRow({ name, value, words }: { name: ReactNode; value: ReactNode; words?: boolean }) {
  return (
    <>
      <dt>{name}</dt>
      <dd className={words ? 'hs-words' : undefined}>{value}</dd>
    </>
  )
}

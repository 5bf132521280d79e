import type { ReactNode } from 'react'
import { classNames } from './class-names.ts'

/** The table under all work. Holes appear only where there is a set-up: a bench, a sign-in page, an empty state. */
export function Ground({ holes = false, children }: { holes?: boolean; children: ReactNode }) {
  return (
    <main id="main" tabIndex={-1} className={classNames('hs-ground', holes && 'hs-holes hs-on-table')}>
      {children}
    </main>
  )
}

/** Title of a place, one sentence about it, and its acts at the right. */
export function PageHead({
  title,
  about,
  plate = false,
  children,
}: {
  title: ReactNode
  about?: ReactNode
  /** On holes the words need ground under them. */
  plate?: boolean
  children?: ReactNode
}) {
  const ground = plate ? 'hs-plate' : undefined
  return (
    <div className="hs-page-head">
      <h1>
        <span className={ground}>{title}</span>
      </h1>
      {about && <p className={ground}>{about}</p>}
      {children && <div className="hs-actions">{children}</div>}
    </div>
  )
}

/** Where one is: a path of links, then states and times, then acts at the right. */
export function Crumbs({ path, beside, acts }: { path: ReactNode[]; beside?: ReactNode; acts?: ReactNode }) {
  return (
    <div className="hs-crumb">
      <ol aria-label="Where you are">
        {path.map((step, at) => (
          <li key={at}>{step}</li>
        ))}
      </ol>
      {beside}
      {acts && <div className="hs-actions">{acts}</div>}
    </div>
  )
}

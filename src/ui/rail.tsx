import type { ReactNode } from 'react'
import { Link } from 'react-router-dom'
import { BrandMark } from './brand.tsx'
import { Icon, type IconName } from './icon.tsx'
import { PersonMenu, type MenuEntry } from './person-menu.tsx'
import { ThemeChoice, ThemeNext } from './theme-choice.tsx'

export type RailItem = {
  to: string
  label: string
  /** For the foot rail, where a fifth of a phone's width must do. */
  shortLabel?: string
  icon: IconName
  current: boolean
  /** How many wait there; 0 or absent shows nothing. */
  count?: number
  /** What the count counts, for those who hear it: "3 waiting". */
  countLabel?: string
  /** Shown in the foot rail of a phone, which has room for five. */
  onPhone?: boolean
}

type RailProps = {
  brand: string
  home: string
  items: RailItem[]
  /** What is live now, in a few words; left out when nothing is. */
  status?: ReactNode
  person?: { name: string; note?: string; entries: MenuEntry[] }
}

/** Navigation is a graduated rail; the current place is a carrier clamped to it. On a phone: top bar and foot rail. */
export function Rail({ brand, home, items, status, person }: RailProps) {
  return (
    <>
      <a className="hs-skip" href="#main">
        Skip to the work
      </a>
      <header className="hs-rail">
        <Link className="hs-brand" to={home} aria-label={brand}>
          <BrandMark />
          <span>{brand}</span>
        </Link>
        <nav aria-label="Places">
          {items.map((item) => (
            <Link key={item.to} to={item.to} aria-current={item.current ? 'page' : undefined}>
              {item.label}
              <Count item={item} />
            </Link>
          ))}
        </nav>
        <div className="hs-rail-end">
          {status && <span className="hs-live">{status}</span>}
          <ThemeChoice />
          <ThemeNext />
          {person && <PersonMenu {...person} />}
        </div>
      </header>
      <FootRail items={items} />
    </>
  )
}

function Count({ item }: { item: RailItem }) {
  if (!item.count) return null
  return (
    <span className="hs-count" aria-label={item.countLabel}>
      {item.count}
    </span>
  )
}

function FootRail({ items }: { items: RailItem[] }) {
  const chosen = items.filter((item) => item.onPhone ?? true).slice(0, 5)
  return (
    <nav className="hs-foot-rail" aria-label="Places, at the foot">
      {chosen.map((item) => (
        <Link key={item.to} to={item.to} aria-current={item.current ? 'page' : undefined}>
          <Icon name={item.icon} size={20} />
          {item.shortLabel ?? item.label}
        </Link>
      ))}
    </nav>
  )
}

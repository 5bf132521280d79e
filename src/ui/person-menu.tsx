import { Menu } from '@base-ui/react/menu'
import { Link } from 'react-router-dom'
import { Initials } from './initials.tsx'

export type MenuEntry = { label: string; note?: string } & ({ to: string } | { act: () => void })

/** Who is signed in, and what belongs to that person: own page, keys, sign out. */
export function PersonMenu({ name, note, entries }: { name: string; note?: string; entries: MenuEntry[] }) {
  return (
    <Menu.Root>
      <Menu.Trigger className="hs-person" aria-label={`${name}: menu`}>
        <Initials name={name} />
        <span>{name}</span>
      </Menu.Trigger>
      <Menu.Portal>
        <Menu.Positioner className="hs-popup-layer" align="end" sideOffset={8}>
          <Menu.Popup className="hs-popup hs-popup-menu">
            {note && <p className="hs-popup-note">{note}</p>}
            {entries.map((entry) => (
              <MenuRow key={entry.label} entry={entry} />
            ))}
          </Menu.Popup>
        </Menu.Positioner>
      </Menu.Portal>
    </Menu.Root>
  )
}

function MenuRow({ entry }: { entry: MenuEntry }) {
  const words = (
    <span>
      {entry.label}
      {entry.note && <small>{entry.note}</small>}
    </span>
  )
  if ('to' in entry) {
    return (
      <Menu.LinkItem className="hs-popup-item hs-popup-plain" closeOnClick render={<Link to={entry.to} />}>
        {words}
      </Menu.LinkItem>
    )
  }
  return (
    <Menu.Item className="hs-popup-item hs-popup-plain" onClick={entry.act}>
      {words}
    </Menu.Item>
  )
}

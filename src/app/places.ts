import type { Role } from '../../server/contract/common.ts'
import type { Session } from '../../server/contract/people.ts'
import type { IconName } from '../ui/icon.tsx'
import type { RailItem } from '../ui/rail.tsx'
import { paths } from './paths.ts'

interface Place {
  path: string
  label: string
  icon: IconName
  /** Who has business there. */
  roles: Role[]
  /** Other addresses that belong to the place. */
  also?: RegExp
}

const everyone: Role[] = ['experimentalist', 'supervisor', 'auditor', 'manager']

const places: Place[] = [
  { path: paths.bench, label: 'Bench', icon: 'bench', roles: everyone },
  {
    path: paths.notebooks,
    label: 'Notebooks',
    icon: 'notebook',
    roles: everyone,
    also: /^\/(notebooks|entries\/[^/]+$)/,
  },
  {
    path: paths.witness,
    label: 'Witness desk',
    icon: 'eye',
    roles: ['supervisor'],
    also: /^\/entries\/[^/]+\/review/,
  },
  { path: paths.ledger, label: 'Ledger', icon: 'chain', roles: everyone },
  { path: paths.people, label: 'People', icon: 'people', roles: everyone },
]

/** Places of the rail for this person, of those whose page is built. */
export function railItems(session: Session, built: string[], at: string): RailItem[] {
  return places
    .filter((place) => built.includes(place.path) && place.roles.some((role) => session.roles.includes(role)))
    .map(({ path, label, icon, also }) => ({
      to: path,
      label,
      icon,
      current: at === path || (also?.test(at) ?? false),
      ...(path === paths.witness ? { count: session.waiting, countLabel: `${session.waiting} waiting` } : {}),
    }))
}

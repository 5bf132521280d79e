import { age } from '../../lib/times.ts'
import { ButtonLink } from '../../ui/button.tsx'
import { Icon } from '../../ui/icon.tsx'
import type { Need } from './needs.ts'

/** What waits for the person; the first has the filled button. */
export function NeedsList({ needs, pathOf }: { needs: Need[]; pathOf: (need: Need) => string }) {
  if (needs.length === 0) return <p className="hs-quiet">Nothing waits for you.</p>
  return (
    <ul className="hs-needs">
      {needs.map((need, at) => (
        <li key={need.key}>
          <Icon name={need.icon} size={18} />
          <div>
            <p>
              <b>{need.title}</b>
            </p>
            <p>{need.detail}</p>
          </div>
          <span className="hs-needs-since">{age(need.since)}</span>
          <ButtonLink kind={at === 0 ? 'primary' : 'plain'} to={pathOf(need)}>
            {need.act}
          </ButtonLink>
        </li>
      ))}
    </ul>
  )
}

import { StateGlyph } from '../../../ui/state-glyph.tsx'
import type { Check } from '../review-checks.ts'

/** What the program found, a line each: a glyph, the finding, and a quiet line of detail. */
export function ChecksList({ checks }: { checks: Check[] }) {
  return (
    <ul className="hs-checks">
      {checks.map((check) => (
        <li key={`${check.what} ${check.more ?? ''}`} className="items-start">
          <StateGlyph state={check.state} wordless />
          <span>
            {check.what}
            {check.more && <small>{check.more}</small>}
          </span>
        </li>
      ))}
    </ul>
  )
}

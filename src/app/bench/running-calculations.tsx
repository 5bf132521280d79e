import { useQueries } from '@tanstack/react-query'
import { Link } from 'react-router-dom'
import type { Entry } from '../../../server/contract/entries.ts'
import { calculationQuery, isGoingOn } from '../../features/calculations/queries.ts'
import { waitText } from '../../lib/format-quantity.ts'
import { Progress } from '../../ui/progress.tsx'
import { Section } from '../../ui/sheet.tsx'
import { entryPath } from '../paths.ts'

/** Calculations under way on the person's sheets; the section is there only while there are any. */
export function RunningCalculations({ entries }: { entries: Entry[] }) {
  const going = entries.flatMap((entry) =>
    entry.calculations
      .filter(({ status }) => isGoingOn(status))
      .map((calculation) => ({ entry, calculation })),
  )
  const details = useQueries({ queries: going.map(({ calculation }) => calculationQuery(calculation.id)) })
  if (going.length === 0) return null
  return (
    <Section title="Calculations running" count={going.length}>
      <ul className="hs-stack">
        {going.map(({ entry, calculation }, at) => {
          const progress = details[at]?.data?.progress
          const share = progress && progress.of > 0 ? progress.done / progress.of : null
          return (
            <li key={calculation.id}>
              <span className="hs-fig">{calculation.label}</span>
              <Link to={entryPath(entry.id)}>{entry.number}</Link>
              <div className="hs-stack-wide">
                <Progress
                  label={`Progress of ${calculation.label}`}
                  share={share}
                  words={progress?.leftS ? `about ${waitText(progress.leftS)} left` : calculation.status}
                />
              </div>
            </li>
          )
        })}
      </ul>
    </Section>
  )
}

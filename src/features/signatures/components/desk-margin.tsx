import { useQuery } from '@tanstack/react-query'
import { sentenceOf } from '../../../lib/api-problem.ts'
import { figureInFull } from '../../../lib/format-quantity.ts'
import { dateAndTime, longDate } from '../../../lib/times.ts'
import { ButtonLink } from '../../../ui/button.tsx'
import { Message } from '../../../ui/message.tsx'
import { Facts, Section } from '../../../ui/sheet.tsx'
import { filesToSign } from '../entry-files.ts'
import { entryForReviewQuery } from '../queries.ts'
import { authorsOf } from './witness-queue.tsx'

/** Beside the queue: what the chosen sheet holds, why it was returned before, and the way into it. */
export function DeskMargin({ entryId }: { entryId: string }) {
  const { data: entry, error } = useQuery(entryForReviewQuery(entryId))
  if (error) return <Message kind="warn">{sentenceOf(error)}</Message>
  if (!entry) return <p className="hs-quiet">Reading the sheet</p>
  return (
    <>
      <p className="hs-fig hs-quiet">{entry.number}</p>
      <h2 className="text-6 leading-tight font-semibold tracking-tight">{entry.title}</h2>
      <p className="hs-quiet mt-1">{authorsOf(entry)}</p>
      <Section title="In it">
        <Facts
          facts={[
            {
              name: 'Submitted',
              value: entry.submittedAt ? dateAndTime(entry.submittedAt) : 'not yet',
              words: true,
            },
            { name: 'Work done', value: longDate(entry.runAt), words: true },
            { name: 'Revision', value: entry.revision },
            { name: 'Runs', value: entry.runs.map((run) => run.number).join(', ') || 'none' },
            { name: 'Files', value: filesToSign(entry).length },
            { name: 'Witnesses', value: `${entry.witnesses.given} of ${entry.witnesses.required}` },
          ]}
        />
      </Section>
      {entry.calculations.some((calculation) => calculation.figures.length > 0) && (
        <Section title="Key figures">
          <ul className="hs-stack">
            {entry.calculations.map((calculation) => (
              <li key={calculation.id}>
                <span className="hs-fig">{calculation.label}</span>
                <span>
                  {calculation.figures.slice(0, 2).map((figure) => (
                    <span key={figure.pointer} className="block">
                      {figure.label} <span className="hs-fig">{figureInFull(figure)}</span>
                    </span>
                  ))}
                </span>
              </li>
            ))}
          </ul>
        </Section>
      )}
      {entry.returned && (
        <Section title="Returned before">
          <p>
            “{entry.returned.reason}”{' '}
            <span className="hs-quiet">
              {entry.returned.by}, {longDate(entry.returned.at)}
            </span>
          </p>
        </Section>
      )}
      <div className="hs-actions mt-6">
        <ButtonLink kind="primary" to={`/entries/${entry.id}/review`}>
          Review sheet
        </ButtonLink>
      </div>
    </>
  )
}

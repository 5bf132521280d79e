import { useState, Fragment } from 'react'
import { TextLink } from '../../../ui/button.tsx'
import { shortDigest } from '../../../ui/digest.tsx'
import { FringeMark } from '../../../ui/fringe-mark.tsx'
import { StateGlyph } from '../../../ui/state-glyph.tsx'
import { eventNumber } from '../event-number.ts'
import { stampTime, zoneInWords } from '../../../lib/times.ts'
import type { ShownEvent } from '../queries.ts'
import { actorWords, eventWords, subjectInWords } from '../event-words.ts'
import { standingOf, type Verification } from '../standing.ts'
import { EventDetails, type SignedHead } from './event-details.tsx'

interface ChainProps {
  events: ShownEvent[]
  verification: Verification | undefined
  head: SignedHead | null
  onSubject: (subject: { id: string; name: string }) => void
}

/** Events newest first, each bound to the one under it. A press on its number opens what it holds and its proof. */
export function EventChain({ events, verification, head, onSubject }: ChainProps) {
  const [open, setOpen] = useState<number | null>(null)
  return (
    <div className="hs-table-wells">
      <table className="hs-table hs-table-tight">
        <thead>
          <tr>
            <th scope="col" className="w-14">
              Link
            </th>
            <th scope="col" className="hs-right">
              Event
            </th>
            <th scope="col" className="hs-desk-only">
              Time, {zoneInWords()}
            </th>
            <th scope="col">What</th>
            <th scope="col" className="hs-desk-only">
              On
            </th>
            <th scope="col" className="hs-desk-only">
              By
            </th>
            <th scope="col" className="hs-desk-only">
              Digest
            </th>
            <th scope="col">Standing</th>
          </tr>
        </thead>
        <tbody>
          {events.map((event, at) => (
            <Fragment key={event.sequence}>
              <EventRow
                event={event}
                first={at === 0}
                standing={standingOf(event.sequence, verification, head?.treeSize ?? null)}
                open={open === event.sequence}
                onToggle={() => setOpen(open === event.sequence ? null : event.sequence)}
              />
              {open === event.sequence && (
                <tr id={detailsId(event.sequence)}>
                  <LinkCell />
                  <td colSpan={7}>
                    <EventDetails event={event} head={head} onSubject={onSubject} />
                  </td>
                </tr>
              )}
            </Fragment>
          ))}
        </tbody>
      </table>
    </div>
  )
}

const detailsId = (sequence: number) => `event-${sequence}`

/** The double rule that runs from mark to mark. */
function LinkCell({ sha256, first = false }: { sha256?: string; first?: boolean }) {
  return (
    <td className="relative">
      <span
        aria-hidden
        className={`absolute -bottom-px left-3 border-l-[3px] border-double border-ink2 ${first ? 'top-1/2' : 'top-0'}`}
      />
      {sha256 && (
        <span className="relative inline-block bg-paper align-middle">
          <FringeMark sha256={sha256} size={26} />
        </span>
      )}
    </td>
  )
}

function EventRow({
  event,
  first,
  standing,
  open,
  onToggle,
}: {
  event: ShownEvent
  first: boolean
  standing: ReturnType<typeof standingOf>
  open: boolean
  onToggle: () => void
}) {
  const subject = <SubjectLink event={event} />
  return (
    <tr>
      <LinkCell sha256={event.digest} first={first} />
      <td className="hs-right">
        <button
          type="button"
          className="hs-link hs-fig min-h-8"
          aria-expanded={open}
          aria-controls={open ? detailsId(event.sequence) : undefined}
          aria-label={`Event ${event.sequence}, ${open ? 'close' : 'open'} its details`}
          onClick={onToggle}
        >
          {eventNumber(event.sequence)}
        </button>
      </td>
      <td className="hs-fig hs-desk-only">{stampTime(event.time)}</td>
      <td>
        <b>{eventWords(event)}</b>
        <span className="hs-phone-only">
          <span className="hs-quiet block text-1">
            {subject}, {stampTime(event.time)}
          </span>
        </span>
      </td>
      <td className="hs-desk-only">{subject}</td>
      <td className="hs-desk-only">{actorWords(event)}</td>
      <td className="hs-fig hs-desk-only">{shortDigest(event.digest)}</td>
      <td className="whitespace-nowrap">
        <StateGlyph state={standing.state}>{standing.words}</StateGlyph>
      </td>
    </tr>
  )
}

function SubjectLink({ event }: { event: ShownEvent }) {
  const words = subjectInWords(event)
  if (event.subject.kind !== 'entry') return <>{words}</>
  return (
    <TextLink className="hs-fig" to={`/entries/${event.subject.id}`}>
      {words}
    </TextLink>
  )
}

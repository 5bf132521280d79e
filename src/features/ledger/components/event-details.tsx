import { useQuery } from '@tanstack/react-query'
import type { ReactNode } from 'react'
import { sentenceOf } from '../../../lib/api-problem.ts'
import { eventNumber } from '../event-number.ts'
import { TextButton } from '../../../ui/button.tsx'
import { groupedDigest } from '../../../ui/digest.tsx'
import { Message } from '../../../ui/message.tsx'
import { Facts } from '../../../ui/sheet.tsx'
import { checkEventHere } from '../check-event.ts'
import { subjectInWords } from '../event-words.ts'
import { inclusionProofQuery, type ShownEvent } from '../queries.ts'

export interface SignedHead {
  treeSize: number
  rootHash: string
}

/** What an event holds: its payload, the digests that bind it, and the check of its place made in this browser. */
export function EventDetails({
  event,
  head,
  onSubject,
}: {
  event: ShownEvent
  head: SignedHead | null
  onSubject: (subject: { id: string; name: string }) => void
}) {
  const name = subjectInWords(event)
  return (
    <div className="grid gap-3 py-1">
      <Facts
        facts={[
          { name: 'Digest', value: groupedDigest(event.digest) },
          { name: 'Before', value: groupedDigest(event.previous) },
          { name: 'Leaf hash', value: groupedDigest(event.leafHash) },
          { name: 'Action', value: event.action },
          {
            name: 'Subject',
            value: `${name}, event ${eventNumber(event.subjectSequence)} of its own chain`,
            words: true,
          },
          ...Object.entries(event.payload).map(([member, value]) => ({
            name: member,
            value: payloadText(value),
          })),
        ]}
      />
      <PlaceCheck event={event} head={head} />
      <p>
        <TextButton onClick={() => onSubject({ id: event.subject.id, name })}>
          Show only events of {name}
        </TextButton>
      </p>
    </div>
  )
}

function payloadText(value: unknown): ReactNode {
  if (value === null) return 'none'
  return typeof value === 'string' || typeof value === 'number' || typeof value === 'boolean'
    ? String(value)
    : JSON.stringify(value)
}

function PlaceCheck({ event, head }: { event: ShownEvent; head: SignedHead | null }) {
  const covered = head !== null && event.sequence <= head.treeSize
  const proof = useQuery({ ...inclusionProofQuery(event.sequence, head?.treeSize ?? 1), enabled: covered })
  if (!covered)
    return (
      <Message>No signed head covers this event yet. The next seal or the end of the day brings one.</Message>
    )
  if (proof.error)
    return (
      <Message kind="warn" title="The proof could not be fetched.">
        {sentenceOf(proof.error)}
      </Message>
    )
  if (!proof.data) return <p className="hs-quiet">Fetching the proof</p>
  const check = checkEventHere(event, proof.data, head)
  if (check.digest && check.inclusion)
    return (
      <Message kind="good" title={`This event stands under head ${eventNumber(head.treeSize)}.`}>
        Checked in this browser: its digest was computed from what is shown here, and{' '}
        {eventNumber(proof.data.path.length)} hashes lead from it to the root{' '}
        {groupedDigest(head.rootHash.slice(0, 16))}…
      </Message>
    )
  return (
    <Message
      kind="fault"
      title={check.digest ? 'The proof does not lead to the head.' : 'The digest is not that of this event.'}
    >
      Checked in this browser. Do not rely on this event; tell the laboratory manager and keep the newest head
      that you have by mail.
    </Message>
  )
}

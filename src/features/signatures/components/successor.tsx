import { useQuery } from '@tanstack/react-query'
import { checkedEnrolment } from '../enrolment.ts'
import { enrolmentQuery } from '../queries.ts'
import { Message } from '../../../ui/message.tsx'

/** A newer key of mine that waits for its endorsement while the one I have still signs; nothing when there is none. */
export function WaitingSuccessor({ myId, currentSha256 }: { myId: string; currentSha256: string }) {
  const { data } = useQuery({ ...enrolmentQuery(myId), retry: false })
  if (!data || data.status !== 'awaiting-endorsement' || data.enrolmentSha256 === currentSha256) return null
  return (
    <Message kind="warn" title="Your new key waits for endorsement.">
      Read these digits to a manager or a supervisor:{' '}
      <span className="hs-fig">{checkedEnrolment(data).digits}</span>. Until then the key you have goes on
      signing, with its own passphrase.
    </Message>
  )
}

import { useQuery } from '@tanstack/react-query'
import { sentenceOf } from '../../../lib/api-problem.ts'
import { eventNumber } from '../event-number.ts'
import { dateAndTime } from '../../../lib/times.ts'
import { Button } from '../../../ui/button.tsx'
import { groupedDigest } from '../../../ui/digest.tsx'
import { FringeMark } from '../../../ui/fringe-mark.tsx'
import { Message } from '../../../ui/message.tsx'
import { headQuery, verificationQuery } from '../queries.ts'
import { resultWords, type Verification } from '../standing.ts'
import { RangeBar } from './range-bar.tsx'

/** The result of the last verification, the bar of all events, and the act that verifies again. */
export function VerificationResult() {
  const verification = useQuery(verificationQuery)
  const head = useQuery(headQuery)
  const result = verification.data
  return (
    <section aria-live="polite">
      <div className="flex flex-wrap items-start gap-x-5 gap-y-3">
        {result?.rootHash && <FringeMark sha256={result.rootHash} size={72} />}
        <div className="min-w-0 flex-1 basis-72">
          <h2 className="text-[1.375rem] leading-tight font-semibold tracking-tight">
            {verification.isFetching ? 'Verifying the chain' : result ? resultWords(result) : 'Not verified'}
          </h2>
          {verification.isFetching ? (
            <p className="mt-1">
              Every link, digest and root is computed again from the stored events. You may leave this page.
            </p>
          ) : (
            result && <ResultDetail result={result} />
          )}
        </div>
        <Button
          kind="primary"
          busy={verification.isFetching}
          onClick={() => {
            void verification.refetch()
            void head.refetch()
          }}
        >
          {verification.isFetching ? 'Verifying' : result ? 'Verify again' : 'Verify'}
        </Button>
      </div>
      {verification.error && (
        <div className="mt-3">
          <Message kind="fault" title="The chain was not verified.">
            {sentenceOf(verification.error)}
          </Message>
        </div>
      )}
      {result && (
        <RangeBar
          events={result.events}
          brokenAt={result.firstBroken?.sequence ?? null}
          head={head.data?.head.treeSize ?? null}
        />
      )}
    </section>
  )
}

function ResultDetail({ result }: { result: Verification }) {
  return (
    <>
      <p className="mt-1">
        {eventNumber(result.events)} events checked in {result.durationS.toFixed(1)} s on{' '}
        {dateAndTime(result.checkedAt)}. {result.firstBroken ? result.firstBroken.detail : result.detail}
      </p>
      {result.rootHash && (
        <p className="hs-quiet mt-1 text-1">
          root <span className="hs-fig hs-digest-full">{groupedDigest(result.rootHash, 8)}</span>
        </p>
      )}
    </>
  )
}

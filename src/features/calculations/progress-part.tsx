import type { Calculation } from '../../../server/contract/calculations.ts'
import { sentenceOf } from '../../lib/api-problem.ts'
import { waitText } from '../../lib/format-quantity.ts'
import { BlockPart } from '../../ui/block.tsx'
import { TextButton } from '../../ui/button.tsx'
import { Message } from '../../ui/message.tsx'
import { Progress } from '../../ui/progress.tsx'
import { useStop } from './mutations.ts'

/** How far a calculation has come, how long it takes yet, and Stop. One may leave: it goes on without us. */
export function ProgressPart({ calculation, editable }: { calculation: Calculation; editable: boolean }) {
  const { id, label, status, progress } = calculation
  const stop = useStop(id)
  const waiting = status === 'queued'
  const seconds = progress?.leftS ?? 0
  const left = seconds < 1 ? '' : `about ${waitText(seconds)} left. `
  return (
    <BlockPart>
      <Progress
        label={`Progress of ${label}`}
        share={waiting ? null : progress && progress.of > 0 ? progress.done / progress.of : null}
        words={
          <>
            {waiting ? 'Waits for its turn or for the file to be read. ' : left}
            You may leave the sheet; it goes on.{' '}
            {editable && (
              <TextButton onClick={() => stop.mutate()} disabled={stop.isPending}>
                {waiting ? 'Withdraw' : 'Stop'}
              </TextButton>
            )}
          </>
        }
      />
      {stop.isError && <Message kind="fault">{sentenceOf(stop.error)}</Message>}
    </BlockPart>
  )
}

import type { Calculation } from '../../../server/contract/calculations.ts'
import { Message } from '../../ui/message.tsx'

/** Why there is no result and what to do; nothing while there is one. */
export function FailureMessage({ calculation }: { calculation: Calculation }) {
  const { status, error } = calculation
  if (status === 'cancelled') {
    return (
      <Message kind="warn" title="Stopped before it was done.">
        Nothing of it was kept. Recompute starts it again from the same file.
      </Message>
    )
  }
  if (status !== 'failed') return null
  const named = error?.errors ?? []
  return (
    <Message
      kind="fault"
      title={`${error?.title ?? 'It could not be computed'}.`}
      code={error?.code ?? 'internal'}
    >
      {error?.detail ?? 'No reason was given.'}
      {named.map(({ pointer, detail }) => (
        <span className="hs-failure-field" key={pointer}>
          {detail}
        </span>
      ))}{' '}
      The file is untouched. Change a parameter above, or correct how the file is read, and it is computed
      again.
    </Message>
  )
}

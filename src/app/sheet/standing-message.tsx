import type { Entry } from '../../../server/contract/entries.ts'
import { dateAndTime } from '../../lib/times.ts'
import { Message } from '../../ui/message.tsx'

/** Why the sheet is not written any more, or why it came back; nothing on a plain draft. */
export function StandingMessage({ entry, editable }: { entry: Entry; editable: boolean }) {
  const { phase, returned, seal } = entry
  if (phase === 'returned' && returned) {
    return (
      <Message kind="warn" title={`Returned by ${returned.by}, ${dateAndTime(returned.at)}.`}>
        {returned.reason}
      </Message>
    )
  }
  if (phase === 'collecting') {
    const missing = entry.authors.filter((author) => !author.signed).map((author) => author.name)
    return (
      <Message title="Locked while the authors sign.">
        {missing.join(' and ')} must still sign. To change the text it must be reopened, which voids the
        signatures given.
      </Message>
    )
  }
  if (phase === 'with-witness') {
    return (
      <Message title="With the witness.">
        The text changes only after a return, or when an author recalls it.
      </Message>
    )
  }
  if (phase === 'sealed' && seal)
    return <Message title="Sealed.">Nothing here can change; an addendum can amend it.</Message>
  if (phase === 'withdrawn')
    return <Message title="Withdrawn.">It keeps its number and stays readable for ever.</Message>
  if (!editable)
    return <Message title="You read this sheet.">Those who write in this notebook can change it.</Message>
  return null
}

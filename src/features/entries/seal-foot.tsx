import type { Entry } from '../../../server/contract/entries.ts'
import { stampTime } from '../../lib/times.ts'
import { SealLine, type Station } from '../../ui/seal-line.tsx'
import { SheetFoot } from '../../ui/sheet.tsx'

/** How far a sheet has come: signed, submitted, countersigned, sealed; who and when at each station. */
export function SealFoot({
  entry,
  children,
  justSealed,
}: {
  entry: Entry
  children?: React.ReactNode
  justSealed?: boolean
}) {
  return (
    <SheetFoot>
      <SealLine
        label={`How far ${entry.number} has come`}
        stations={stationsOf(entry)}
        justDone={justSealed}
      />
      {children}
    </SheetFoot>
  )
}

function stationsOf(entry: Entry): Station[] {
  const living = entry.signatures.filter((signature) => !signature.voided)
  const authors = living.filter((signature) => signature.meaning === 'authorship')
  const witnesses = living.filter((signature) => signature.meaning !== 'authorship')
  const submitted = entry.state === 'submitted' || entry.state === 'sealed'
  const sealed = entry.seal
  const witnessed = witnesses.length >= entry.witnesses.required && submitted
  const done = [authors.length > 0, submitted, witnessed, sealed !== null]
  const returned = entry.phase === 'returned' && entry.returned
  const current = done.indexOf(false)
  const named = (signatures: typeof living) =>
    signatures.map(({ signer, time }) => `${signer.name}, ${stampTime(time)}`)
  const stations: Station[] = [
    {
      name: 'Signed by author',
      state: done[0] ? 'done' : 'todo',
      drawing: 'signature',
      lines: done[0] ? named(authors) : ['signs text, files and calculations'],
    },
    {
      name: returned ? 'Returned' : 'Submitted',
      state: returned ? 'returned' : done[1] ? 'done' : 'todo',
      drawing: 'arrow',
      lines: submittedLines(entry),
    },
    {
      name: 'Countersigned',
      state: done[2] ? 'done' : 'todo',
      drawing: 'half',
      lines: witnesses.length > 0 ? named(witnesses) : ['by the witness'],
    },
    {
      name: 'Sealed in the ledger',
      state: sealed ? 'done' : 'todo',
      drawing: 'full',
      lines: sealed
        ? [`event ${sealed.sequence}`, stampTime(sealed.time)]
        : ['nothing can change afterwards'],
      sha256: sealed?.digest,
    },
  ]
  return stations.map((station, at) => ({ ...station, current: at === current }))
}

function submittedLines({ phase, returned, submittedAt, state }: Entry): string[] {
  if (phase === 'returned' && returned)
    return [`by ${returned.by}, ${stampTime(returned.at)}`, returned.reason]
  if (submittedAt !== null) return [stampTime(submittedAt)]
  return [state === 'sealed' ? 'to the witness' : 'to a witness who is not an author']
}

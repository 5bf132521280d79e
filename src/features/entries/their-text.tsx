import { useQuery } from '@tanstack/react-query'
import { plainText, type NormalDocument } from '../../../server/document/index.ts'
import { sentenceOf } from '../../lib/api-problem.ts'
import { saveAsFile } from '../../lib/save-as-file.ts'
import { Button } from '../../ui/button.tsx'
import { Dialog } from '../../ui/dialog.tsx'
import { Message } from '../../ui/message.tsx'
import { contentQuery } from './queries.ts'

interface TheirTextProps {
  entryId: string
  mine: NormalDocument
  busy: boolean
  onSaveMine: () => void
  onTakeTheirs: (document: NormalDocument, etag: string) => void
  onClose: () => void
}

/** The text on the server beside the one on the screen, and the choice between them. */
export function TheirText({ entryId, mine, busy, onSaveMine, onTakeTheirs, onClose }: TheirTextProps) {
  const { data: theirs, error } = useQuery(contentQuery(entryId))
  return (
    <Dialog
      open
      wide
      locked={busy}
      onClose={onClose}
      title="Two texts of this sheet"
      about="Saving yours makes theirs a revision of its own, so both stay in the history. Taking theirs drops what you wrote since the last save; keep a copy first if you need it."
      actions={
        <>
          <Button busy={busy} onClick={onSaveMine}>
            Save mine as a new revision
          </Button>
          <Button busy={busy || !theirs} onClick={() => theirs && onTakeTheirs(theirs.document, theirs.etag)}>
            Take theirs
          </Button>
          <CopyOfMine mine={mine} />
          <Button kind="quiet" onClick={onClose}>
            Decide later
          </Button>
        </>
      }
    >
      {error && <Message kind="fault">{sentenceOf(error)}</Message>}
      <div className="hs-two-texts">
        <TextColumn title="Saved on the server" document={theirs?.document ?? null} other={mine} />
        <TextColumn title="Yours, on the screen" document={mine} other={theirs?.document ?? null} />
      </div>
    </Dialog>
  )
}

function CopyOfMine({ mine }: { mine: NormalDocument }) {
  return (
    <Button onClick={() => saveAsFile(plainText(mine), 'my-text.txt', 'text/plain')}>
      Keep a copy of mine
    </Button>
  )
}

/** Lines of a text; those that the other text does not have are marked. */
function TextColumn({
  title,
  document,
  other,
}: {
  title: string
  document: NormalDocument | null
  other: NormalDocument | null
}) {
  const known = new Set(other ? plainText(other).split('\n') : [])
  const lines = document ? plainText(document).split('\n') : []
  return (
    <section>
      <h3>{title}</h3>
      <div className="hs-two-texts-body" tabIndex={0}>
        {lines.map((line, at) =>
          other !== null && !known.has(line) ? <ins key={at}>{line}</ins> : <p key={at}>{line}</p>,
        )}
      </div>
    </section>
  )
}

import { useState } from 'react'
import { plainText, type NormalDocument } from '../../../server/document/index.ts'
import { saveAsFile } from '../../lib/save-as-file.ts'
import { Button } from '../../ui/button.tsx'
import { Icon } from '../../ui/icon.tsx'
import type { ContentSaver, SaveState } from './content-saver.ts'
import { useSecondsUntil } from './save-state.tsx'
import { TheirText } from './their-text.tsx'

interface TroubleProps {
  saver: ContentSaver
  state: SaveState
  document: () => NormalDocument
  /** File name for a copy, without ending. */
  copyName: string
  entryId: string
  /** Puts a text of the server on the screen in place of this one. */
  onTakeTheirs: (document: NormalDocument, etag: string) => void
}

/** What stands above the sheet while its text is not safe: why, and the ways on. */
export function SaveTrouble(props: TroubleProps) {
  const { state, saver } = props
  const copy = <CopyButton document={props.document} name={props.copyName} />
  if (state.name === 'offline')
    return <Offline state={state} onTry={() => void saver.retryNow()} copy={copy} />
  if (state.name === 'conflict') return <Conflict {...props} copy={copy} />
  if (state.name === 'refused') {
    return (
      <Alert title="This text was not accepted" code={state.problem.code} actions={copy}>
        {state.problem.detail} Your text is still on the screen; nothing of it was saved since the last time
        shown.
      </Alert>
    )
  }
  return null
}

type OfflineState = Extract<SaveState, { name: 'offline' }>

function Offline({ state, onTry, copy }: { state: OfflineState; onTry: () => void; copy: React.ReactNode }) {
  const seconds = useSecondsUntil(state.nextTryAt)
  return (
    <Alert
      title="Saving has stopped"
      code={state.problem.code}
      note={`Tried ${state.attempts === 1 ? 'once' : `${state.attempts} times`}, next try in ${seconds} s.`}
      actions={
        <>
          <Button kind="primary" onClick={onTry}>
            Try now
          </Button>
          {copy}
        </>
      }
    >
      {state.problem.detail} It will be sent as soon as the server answers. Keep this window open.
    </Alert>
  )
}

function Conflict({
  saver,
  entryId,
  onTakeTheirs,
  document,
  copy,
}: TroubleProps & { copy: React.ReactNode }) {
  const [comparing, setComparing] = useState(false)
  const [busy, setBusy] = useState(false)

  async function saveMine() {
    setBusy(true)
    await saver.saveMineOnTop()
    setBusy(false)
    setComparing(false)
  }

  return (
    <>
      <Alert
        title="Someone else saved first"
        code="stale-content"
        actions={
          <>
            <Button kind="primary" onClick={() => setComparing(true)}>
              Compare the two
            </Button>
            {copy}
          </>
        }
      >
        This sheet was saved from another window since you opened it. Your text is on the screen and nothing
        was overwritten. Compare the two, then choose which goes on; the other stays in the history.
      </Alert>
      {comparing && (
        <TheirText
          entryId={entryId}
          mine={document()}
          busy={busy}
          onSaveMine={() => void saveMine()}
          onTakeTheirs={onTakeTheirs}
          onClose={() => setComparing(false)}
        />
      )}
    </>
  )
}

function CopyButton({ document, name }: { document: () => NormalDocument; name: string }) {
  return (
    <Button onClick={() => saveAsFile(plainText(document()), `${name}.txt`, 'text/plain')}>
      Keep a copy as a file
    </Button>
  )
}

interface AlertProps {
  title: string
  code: string
  note?: string
  children: React.ReactNode
  actions: React.ReactNode
}

function Alert({ title, code, note, children, actions }: AlertProps) {
  return (
    <section className="hs-sheet hs-alert" role="alert">
      <Icon name="alert" size={26} />
      <div>
        <h2>{title}</h2>
        <p>{children}</p>
        <p className="hs-quiet" aria-live="off">
          {note} Code <span className="hs-fig">{code}</span>, for the lab manager.
        </p>
      </div>
      <div className="hs-alert-actions">{actions}</div>
    </section>
  )
}

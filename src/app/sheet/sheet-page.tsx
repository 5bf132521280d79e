import type { Editor } from '@tiptap/react'
import { useCallback, useEffect, useMemo, useRef, useState } from 'react'
import type { EntrySummary, Entry } from '../../../server/contract/entries.ts'
import type { Notebook } from '../../../server/contract/notebooks.ts'
import type { Session } from '../../../server/contract/people.ts'
import type { NormalDocument } from '../../../server/document/index.ts'
import { EditorPartsProvider } from '../../editor/editor-parts.ts'
import { SheetEditor } from '../../editor/sheet-editor.tsx'
import { Toolbar } from '../../editor/toolbar.tsx'
import { InsertCalculation } from '../../features/calculations/insert-calculation.tsx'
import { experimentNames } from '../../features/entries/experiments.ts'
import { SaveStateLine } from '../../features/entries/save-state.tsx'
import { SaveTrouble } from '../../features/entries/save-trouble.tsx'
import { SealFoot } from '../../features/entries/seal-foot.tsx'
import { Spine } from '../../features/entries/spine.tsx'
import { useContentSaver } from '../../features/entries/use-content-saver.ts'
import { DropZone } from '../../features/files/drop-zone.tsx'
import { UploadLines } from '../../features/files/upload-lines.tsx'
import { BeamStrip } from '../../features/runs/beam-strip.tsx'
import { SignatureList } from '../../features/signatures/index.ts'
import { sentenceOf } from '../../lib/api-problem.ts'
import { Button } from '../../ui/button.tsx'
import { Ground } from '../../ui/ground.tsx'
import { Message } from '../../ui/message.tsx'
import { Sheet, SheetBody, SheetRow } from '../../ui/sheet.tsx'
import { useKeys } from '../../ui/use-keys.ts'
import { entryPath, notebookPath } from '../paths.ts'
import { LeaveGuard } from './leave-guard.tsx'
import { OutsideLink } from './outside-link.tsx'
import { SheetCrumbs } from './sheet-crumbs.tsx'
import { SheetHeading } from './sheet-heading.tsx'
import { SheetMargin } from './sheet-margin.tsx'
import { StandingMessage } from './standing-message.tsx'
import { useBeside } from './use-beside.ts'
import { useFileField } from './use-file-field.tsx'
import { useFollowServer } from './use-follow-server.ts'
import { useNewAuthor } from './use-new-author.ts'
import { filesOf } from './use-open-entry.ts'
import { usePlacing } from './use-placing.ts'
import { useSheetParts } from './use-sheet-parts.tsx'
import { useUploads } from './use-uploads.ts'
import './sheet.css'

interface SheetPageProps {
  entry: Entry
  notebook: Notebook
  entries: EntrySummary[]
  session: Session
  content: { document: NormalDocument; etag: string }
}

/** The sheet: where a run is written down, computed and signed. */
export function SheetPage({ entry, notebook, entries, session, content }: SheetPageProps) {
  const editable = entry.allowed.includes('edit')
  const [editor, setEditor] = useState<Editor | null>(null)
  const [asking, setAsking] = useState(false)
  const body = useRef<HTMLDivElement>(null)
  const text = useCallback(
    () => (editor ? (editor.getJSON() as NormalDocument) : content.document),
    [editor, content],
  )
  const { saver, state } = useContentSaver(entry.id, content.etag, text)
  const placing = usePlacing(entry, editor)
  const { list, uploads } = useUploads(entry, placing.placePicture)
  const addFiles = useCallback((files: File[]) => list.add(files), [list])
  const files = useFileField(addFiles)
  const pictures = useFileField(addFiles, 'image/png,image/jpeg,image/webp')
  const picture = pictures.open
  const asks = useMemo(() => ({ calculation: () => setAsking(true), picture }), [picture])
  const { parts, leaving, stay } = useSheetParts(entry, editable, asks)
  useFollowServer(entry.id, editor, saver)
  useBeside(body)
  useEffect(() => () => void saver.leave(), [saver])
  useNewAuthor(entry, state)
  useKeys({ e: () => editable && editor?.commands.focus('end') })

  function takeTheirs(document: NormalDocument, etag: string) {
    editor?.commands.setContent(document, { emitUpdate: false })
    saver.adopt(etag)
  }

  return (
    <EditorPartsProvider value={parts}>
      <Ground>
        <SheetCrumbs {...{ entry, notebook, session, state, saver, text }} />
        <div className="hs-with-spine">
          <Spine
            notebook={notebook}
            notebookPath={notebookPath(notebook.id)}
            entries={entries}
            currentId={entry.id}
            pathOf={entryPath}
          />
          <div>
            <SaveTrouble
              saver={saver}
              state={state}
              document={text}
              copyName={entry.number.replace('/', '-')}
              entryId={entry.id}
              onTakeTheirs={takeTheirs}
            />
            <DropZone enabled={editable} onFiles={addFiles}>
              <Sheet>
                <SheetHeading {...{ entry, notebook, editable }} />
                <BeamStrip entry={entry} experimentName={experimentNames[entry.experiment]} />
                {editable && editor && <Toolbar editor={editor} end={<SaveStateLine state={state} />} />}
                <div ref={body}>
                  <SheetBody>
                    <SheetRow
                      margin={
                        <>
                          <SheetMargin
                            {...{ entry, editable }}
                            onStandardSet={editable ? placing.startStandardSet : null}
                          />
                          <UploadLines list={list} uploads={uploads} />
                          {editable && <AttachFiles onOpen={files.open} />}
                        </>
                      }
                    >
                      <StandingMessage entry={entry} editable={editable} />
                      {placing.trouble && <Message kind="fault">{sentenceOf(placing.trouble)}</Message>}
                      <SheetEditor
                        initial={content.document}
                        editable={editable}
                        label={`Text of ${entry.number}`}
                        onChange={() => saver.changed()}
                        onReady={setEditor}
                      />
                    </SheetRow>
                  </SheetBody>
                </div>
                <SealFoot entry={entry}>
                  <SignatureList signatures={entry.signatures} />
                </SealFoot>
              </Sheet>
            </DropZone>
          </div>
        </div>
      </Ground>
      {files.field}
      {pictures.field}
      {asking && (
        <InsertCalculation
          entryId={entry.id}
          files={filesOf(entry)}
          onStarted={(ids) => {
            setAsking(false)
            placing.placeCalculations(ids)
          }}
          onClose={() => setAsking(false)}
        />
      )}
      <OutsideLink href={leaving} onClose={stay} />
      <LeaveGuard saver={saver} />
    </EditorPartsProvider>
  )
}

function AttachFiles({ onOpen }: { onOpen: () => void }) {
  return (
    <div className="hs-attach">
      <Button size="small" icon="upload" onClick={onOpen}>
        Attach files
      </Button>
      <span className="hs-quiet">or drop them anywhere on the sheet</span>
    </div>
  )
}

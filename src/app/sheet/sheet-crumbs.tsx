import type { Entry } from '../../../server/contract/entries.ts'
import type { Notebook } from '../../../server/contract/notebooks.ts'
import type { Session } from '../../../server/contract/people.ts'
import type { ContentSaver, SaveState } from '../../features/entries/content-saver.ts'
import { glyphOf, sheetNumber } from '../../features/entries/entry-state.ts'
import { ExportEntryButton } from '../../features/exports/index.ts'
import { LifeActs, SignAct } from '../../features/signatures/index.ts'
import { Button, ButtonLink, TextLink } from '../../ui/button.tsx'
import { Crumbs } from '../../ui/ground.tsx'
import { StateGlyph } from '../../ui/state-glyph.tsx'
import { notebookPath, paths, reviewPath } from '../paths.ts'

interface SheetCrumbsProps {
  entry: Entry
  notebook: Notebook
  session: Session
  state: SaveState
  saver: ContentSaver
  /** The text as it stands on the screen. */
  text: () => unknown
}

/** Where the sheet stands: notebook, number, state, saved or not, and the acts open to this person. */
export function SheetCrumbs({ entry, notebook, session, state, saver, text }: SheetCrumbsProps) {
  const me = { id: session.person.id, name: session.person.name }
  const unsafe = state.name === 'offline' || state.name === 'conflict' || state.name === 'refused'
  return (
    <Crumbs
      path={[
        <TextLink key="all" to={paths.notebooks}>
          Notebooks
        </TextLink>,
        <TextLink key="notebook" to={notebookPath(notebook.id)}>
          {notebook.number} {notebook.title}
        </TextLink>,
        <b key="sheet" className="hs-fig" aria-current="page">
          {sheetNumber(entry.number)}
        </b>,
      ]}
      beside={<StateGlyph state={glyphOf(entry.phase)} />}
      acts={
        <>
          <LifeActs entry={entry} me={me} />
          {entry.allowed.includes('export') && <ExportEntryButton entry={entry} />}
          {entry.allowed.includes('witness:read') && (
            <ButtonLink kind="primary" icon="eye" to={reviewPath(entry.id)}>
              Read as witness
            </ButtonLink>
          )}
          {unsafe && entry.allowed.includes('sign:authorship') ? (
            <Button icon="pen" disabledReason="The text is not saved.">
              Sign and submit
            </Button>
          ) : (
            <SignAct
              sheet={{
                entry,
                me,
                laboratoryId: session.laboratory.id,
                shownContent: text,
                save: () => saver.flush(),
              }}
            />
          )}
        </>
      }
    />
  )
}

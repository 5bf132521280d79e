import { useState } from 'react'
import { useNavigate } from 'react-router-dom'
import type { Notebook } from '../../server/contract/notebooks.ts'
import { StartSheet, type SheetStart } from '../features/entries/start-sheet.tsx'
import { TemplateList } from '../features/entries/template-list.tsx'
import { variantOf } from '../features/runs/beam-figures.ts'
import { MiniBeam } from '../plots/beam-path/beam-path.tsx'
import { Button, TextButton } from '../ui/button.tsx'
import { Section } from '../ui/sheet.tsx'
import { entryPath } from './paths.ts'

/** Opens the dialog that starts a sheet in one of these notebooks, and goes to the sheet once it is there. */
export function useStartHere(notebooks: Notebook[]) {
  const [start, setStart] = useState<SheetStart | null>(null)
  const navigate = useNavigate()
  const writable = notebooks.filter((notebook) => notebook.allowed.includes('write'))
  const dialog = start && (
    <StartSheet
      start={start}
      notebooks={writable}
      onClose={() => setStart(null)}
      onStarted={(id) => void navigate(entryPath(id))}
    />
  )
  return { start: setStart, dialog, possible: writable.length > 0 }
}

type StartHere = ReturnType<typeof useStartHere>

const blank: SheetStart = { experiment: 'other', title: '', withHeads: false }

/** Templates with their set-ups, as cards of a grid. */
export function Templates({ here, withAbout }: { here: StartHere; withAbout?: boolean }) {
  return (
    <TemplateList
      withAbout={withAbout}
      picture={({ experiment }) => <MiniBeam variant={variantOf(experiment) ?? 'hbt'} />}
      onChoose={({ experiment, title }) => here.start({ experiment, title, withHeads: true })}
    />
  )
}

export function BlankSheetButton({ here }: { here: StartHere }) {
  return (
    <Button kind="primary" icon="plus" onClick={() => here.start(blank)}>
      Blank sheet
    </Button>
  )
}

/** The part of a margin from which a sheet is started: templates, and a blank one. */
export function StartSection({ here }: { here: StartHere }) {
  return (
    <Section title="Start a sheet">
      <div className="hs-templates">
        <Templates here={here} />
      </div>
      <p className="hs-under-templates">
        <TextButton onClick={() => here.start(blank)}>Blank sheet</TextButton>
      </p>
    </Section>
  )
}

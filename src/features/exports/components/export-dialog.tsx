import { useState } from 'react'
import { Button } from '../../../ui/button.tsx'
import { Dialog, DialogPart } from '../../../ui/dialog.tsx'
import { ExportAct, RawChoice } from './export-form.tsx'

/** The act on a sealed sheet: a bundle of this entry and its sealed addenda. */
export function ExportEntryButton({ entry }: { entry: { id: string; number: string; title: string } }) {
  const [open, setOpen] = useState(false)
  const [withRaw, setWithRaw] = useState(true)
  return (
    <>
      <Button icon="download" onClick={() => setOpen(true)}>
        Export
      </Button>
      <Dialog
        open={open}
        onClose={() => setOpen(false)}
        title={`Export ${entry.number}`}
        about={`${entry.title}, with its sealed addenda`}
        actions={<Button onClick={() => setOpen(false)}>Close</Button>}
      >
        <DialogPart>
          <RawChoice withRaw={withRaw} onChange={setWithRaw} />
        </DialogPart>
        <DialogPart>
          <ExportAct choice={{ entryIds: [entry.id], withoutRaw: !withRaw }} disabledReason={null} />
        </DialogPart>
      </Dialog>
    </>
  )
}

import type { Editor } from '@tiptap/react'
import type { Entry } from '../../../server/contract/entries.ts'
import type { RawFile } from '../../../server/contract/files.ts'
import { insertBlocks } from '../../editor/place.ts'
import { useStartCalculations } from '../../features/calculations/mutations.ts'
import { standardSet } from '../../features/calculations/standard-set.ts'
import { filesOf } from './use-open-entry.ts'
import { isPicture } from './use-uploads.ts'

/** Puts what was made elsewhere on the page into the text: pictures that were stored, calculations that were started. */
export function usePlacing(entry: Entry, editor: Editor | null) {
  const start = useStartCalculations(entry.id)

  function placePicture(file: RawFile) {
    if (!editor || !isPicture(file.name)) return
    insertBlocks(editor, [{ type: 'image', attrs: { fileId: file.id, alt: '', caption: '' } }])
  }

  function placeCalculations(ids: string[]) {
    if (!editor) return
    const blocks = ids.map((calculationId) => ({ type: 'calculation', attrs: { calculationId } }))
    insertBlocks(editor, blocks)
  }

  function startStandardSet(fileId: string) {
    const file = filesOf(entry).find((each) => each.id === fileId)
    if (!file) return
    start.mutate(standardSet(file), {
      onSuccess: (started) => placeCalculations(started.map(({ id }) => id)),
    })
  }

  return { placePicture, placeCalculations, startStandardSet, trouble: start.error }
}

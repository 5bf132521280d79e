import { useState } from 'react'
import type { RawFile } from '../../../server/contract/files.ts'
import { roughCount, sizeText } from '../../lib/format-quantity.ts'
import { durationText } from '../../lib/picoseconds.ts'
import { urlOf } from '../../lib/url-of.ts'
import { TextButton } from '../../ui/button.tsx'
import { FringeMark } from '../../ui/fringe-mark.tsx'
import { Icon } from '../../ui/icon.tsx'
import { StateGlyph } from '../../ui/state-glyph.tsx'
import { ReadingPart } from './reading-part.tsx'

interface FileChipProps {
  file: RawFile
  editable: boolean
  /** What can be done with the file on this sheet, for example standard calculations. */
  acts?: React.ReactNode
}

/** A file in the margin: what it is, how it was read, and the mark of its bytes. */
export function FileChip({ file, editable, acts }: FileChipProps) {
  const { status, detail } = file.reading
  const readable = !isPictureOrPaper(file.name)
  const needsLook = readable && (status === 'unreadable' || (status === 'ready' && detail !== null))
  const [open, setOpen] = useState(false)
  const shown = open || (needsLook && editable)
  return (
    <div className="hs-file">
      <div className="hs-chip">
        <Icon name={iconOf(file)} size={18} />
        <span>
          <a className="hs-chip-name" href={urlOf('getFileContent', { id: file.id })} download={file.name}>
            {file.name}
          </a>
          <span className="hs-chip-note">{noteOf(file)}</span>
        </span>
        <FringeMark sha256={file.sha256} size={26} />
      </div>
      <StorageState file={file} />
      <p className="hs-file-acts">
        {acts}
        {readable && status !== 'pending' && !needsLook && (
          <TextButton aria-expanded={open} onClick={() => setOpen(!open)}>
            {open ? 'Hide the reading' : 'How it is read'}
          </TextButton>
        )}
      </p>
      {shown && <ReadingPart file={file} editable={editable} />}
    </div>
  )
}

function iconOf({ reading, name }: RawFile) {
  if (reading.kind === 'tags') return 'trace'
  return isPictureOrPaper(name) ? 'image' : 'file'
}

/** Files that hold no numbers to read: nobody needs to be told so. */
function isPictureOrPaper(name: string): boolean {
  return /\.(png|jpe?g|webp|tiff?|pdf)$/i.test(name)
}

function noteOf({ reading, size }: RawFile): string {
  const parts = [sizeText(size)]
  if (reading.status === 'pending') parts.unshift('being read')
  if (reading.status === 'unreadable') parts.unshift('cannot be read')
  if (reading.kind === 'tags' && reading.tags !== null)
    parts.unshift(`${roughCount(reading.tags)} time stamps`)
  if (reading.durationPs !== null) parts.push(durationText(reading.durationPs))
  return parts.join(', ')
}

function StorageState({ file }: { file: RawFile }) {
  if (file.state === 'mismatch')
    return <StateGlyph state="fault">The store’s copy differs from what was uploaded</StateGlyph>
  if (file.state === 'missing') return <StateGlyph state="fault">The store has lost this file</StateGlyph>
  const same = file.sameBytesAs[0]
  if (same) return <p className="hs-note hs-quiet">The same bytes are here already as {same.name}.</p>
  return null
}

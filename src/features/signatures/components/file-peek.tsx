import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import type { RawFile } from '../../../../server/contract/files.ts'
import { sentenceOf } from '../../../lib/api-problem.ts'
import { countText, sizeText } from '../../../lib/format-quantity.ts'
import { dateAndTime } from '../../../lib/times.ts'
import { urlOf } from '../../../lib/url-of.ts'
import { Button, TextButton } from '../../../ui/button.tsx'
import { groupedDigest } from '../../../ui/digest.tsx'
import { Dialog, DialogPart } from '../../../ui/dialog.tsx'
import { FringeMark } from '../../../ui/fringe-mark.tsx'
import { Icon } from '../../../ui/icon.tsx'
import { Message } from '../../../ui/message.tsx'
import { Facts } from '../../../ui/sheet.tsx'
import { firstBytesQuery, linesOf } from '../first-bytes.ts'

/** Opens a raw file for the witness: what it is, how it was read, and how it begins, straight from the store. */
export function FilePeek({ file, onOpened }: { file: RawFile; onOpened: () => void }) {
  const [open, setOpen] = useState(false)
  return (
    <>
      <TextButton onClick={() => setOpen(true)}>Open {file.name}</TextButton>
      <Dialog
        open={open}
        onClose={() => setOpen(false)}
        wide
        title={file.name}
        about={`${sizeText(file.size)}, uploaded by ${file.uploadedByName} on ${dateAndTime(file.uploadedAt)}`}
        actions={
          <>
            <a className="hs-button" href={urlOf('getFileContent', { id: file.id })} download={file.name}>
              <Icon name="download" size={17} />
              Download all
            </a>
            <Button onClick={() => setOpen(false)}>Close</Button>
          </>
        }
      >
        <DialogPart>
          <div className="flex items-start gap-4">
            <FringeMark sha256={file.sha256} size={52} />
            <p className="hs-fig hs-digest-full text-2">{groupedDigest(file.sha256)}</p>
          </div>
        </DialogPart>
        <DialogPart>
          <ReadingFacts reading={file.reading} />
        </DialogPart>
        {open && <Beginning file={file} onOpened={onOpened} />}
      </Dialog>
    </>
  )
}

function ReadingFacts({ reading }: { reading: RawFile['reading'] }) {
  if (reading.status !== 'ready')
    return (
      <p>
        {reading.detail ??
          (reading.status === 'pending' ? 'Not read yet.' : 'It cannot be read as time tags or a table.')}
      </p>
    )
  return (
    <Facts
      facts={[
        { name: 'Read as', value: reading.format ?? 'unknown' },
        ...(reading.tags === null ? [] : [{ name: 'Time tags', value: countText(reading.tags) }]),
        ...(reading.channels ?? []).map((channel) => ({
          name: `Channel ${channel.channel}`,
          value: `${countText(channel.counts)} counts`,
        })),
        ...(reading.detail === null ? [] : [{ name: 'Note', value: reading.detail, words: true }]),
      ]}
    />
  )
}

function Beginning({ file, onOpened }: { file: RawFile; onOpened: () => void }) {
  const first = useQuery(firstBytesQuery(file, onOpened))
  if (first.error)
    return (
      <Message kind="fault" title="The file could not be opened.">
        {sentenceOf(first.error)}
      </Message>
    )
  if (!first.data) return <p className="hs-quiet mt-4">Opening</p>
  const lines = linesOf(first.data)
  return (
    <DialogPart>
      <p className="hs-label">{lines ? 'How it begins' : 'Not text; it begins with these bytes'}</p>
      <pre
        className={`hs-fig max-h-60 overflow-auto bg-well p-2.5 text-1 ${lines ? 'whitespace-pre' : 'whitespace-pre-wrap'}`}
      >
        {lines
          ? lines.join('\n')
          : [...first.data.slice(0, 256)].map((byte) => byte.toString(16).padStart(2, '0')).join(' ')}
      </pre>
    </DialogPart>
  )
}

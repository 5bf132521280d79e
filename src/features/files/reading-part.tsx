import type { RawFile } from '../../../server/contract/files.ts'
import { countText } from '../../lib/format-quantity.ts'
import { durationText } from '../../lib/picoseconds.ts'
import { Message } from '../../ui/message.tsx'
import { Facts } from '../../ui/sheet.tsx'
import { ReadingForm } from './reading-form.tsx'

/** How a file is read and what was found in it; while the sheet is written, with a form to correct it. */
export function ReadingPart({ file, editable }: { file: RawFile; editable: boolean }) {
  const { reading } = file
  return (
    <div className="hs-reading">
      {reading.detail !== null && (
        <Message
          kind={reading.status === 'unreadable' ? 'fault' : 'warn'}
          title={reading.status === 'unreadable' ? 'It cannot be read as it stands.' : undefined}
        >
          {reading.detail}
        </Message>
      )}
      {reading.status === 'ready' && <Facts facts={factsOf(file)} />}
      {editable && <ReadingForm key={JSON.stringify(reading.options)} file={file} />}
    </div>
  )
}

function factsOf({ reading }: RawFile) {
  const { format, options, tags, durationPs, resolutionPs, outOfOrder, channels } = reading
  const all = [
    { name: 'Format', value: format, words: true },
    ...Object.entries(options ?? {}).map(([name, value]) => ({
      name: name.charAt(0).toUpperCase() + name.slice(1),
      value: typeof value === 'object' ? JSON.stringify(value) : String(value),
    })),
    { name: 'Time stamps', value: tags === null ? null : countText(tags) },
    { name: 'Duration', value: durationPs === null ? null : durationText(durationPs) },
    { name: 'Resolution', value: resolutionPs === null ? null : durationText(resolutionPs) },
    { name: 'Out of order', value: outOfOrder ? countText(outOfOrder) : null },
    ...(channels ?? []).map(({ channel, counts }) => ({
      name: `Channel ${channel}`,
      value: countText(counts),
    })),
  ]
  return all.filter((fact): fact is typeof fact & { value: string } => fact.value !== null)
}

import type { Entry } from '../../../../server/contract/entries.ts'
import { StateGlyph } from '../../../ui/state-glyph.tsx'
import { filesToSign } from '../entry-files.ts'
import { LateRemark } from './late-remark.tsx'

type Block = Entry['blocks'][number]

/** What stands in the way of signing, a sentence each, with a way to the place on the sheet or the means to mend it here. */
export function BlocksList({
  entry,
  onGo,
  onMended,
}: {
  entry: Entry
  onGo: () => void
  onMended: () => void
}) {
  return (
    <ul className="hs-checks" aria-label="What stands in the way">
      {entry.blocks.map((block) => {
        const place = placeOf(block, entry)
        return (
          <li key={`${block.code} ${block.pointer ?? ''}`} className="items-start">
            <StateGlyph state="fault" wordless />
            <span>
              {block.detail}{' '}
              {place && (
                <a
                  className="hs-link"
                  href={`#${place.anchor}`}
                  onClick={(event) => {
                    event.preventDefault()
                    onGo()
                    // The dialog gives the focus back first; then the place comes into view.
                    setTimeout(() => goTo(place.anchor))
                  }}
                >
                  Go to {place.name}
                </a>
              )}
              {block.code === 'late-remark-missing' && <LateRemark entryId={entry.id} onKept={onMended} />}
            </span>
          </li>
        )
      })}
    </ul>
  )
}

function goTo(anchor: string): void {
  const place = document.getElementById(anchor)
  place?.scrollIntoView({ block: 'center' })
  if (place instanceof HTMLElement) place.focus({ preventScroll: true })
}

/** The calculation or file that a block's pointer names, when it stands on the sheet. */
function placeOf(block: Block, entry: Entry): { anchor: string; name: string } | null {
  const pointer = block.pointer
  if (pointer === null) return null
  const calculation = entry.calculations.find((each) => pointer.includes(each.id))
  if (calculation && document.getElementById(calculation.id))
    return { anchor: calculation.id, name: calculation.label }
  const file = filesToSign(entry).find((each) => pointer.includes(each.id))
  if (file && document.getElementById(file.id)) return { anchor: file.id, name: file.name }
  return null
}

import type { Entry } from '../../../server/contract/entries.ts'
import { glyphOf } from '../../features/entries/entry-state.ts'
import { ButtonLink, TextLink } from '../../ui/button.tsx'
import { Crumbs } from '../../ui/ground.tsx'
import { StateGlyph } from '../../ui/state-glyph.tsx'
import { paths, reviewPath } from '../paths.ts'

/** Where the sheet stands in the queue, and the way to the one before and after it. */
export function ReviewCrumbs({ entry, queue }: { entry: Entry; queue: { id: string }[] }) {
  const at = queue.findIndex((each) => each.id === entry.id)
  const before = queue[at - 1]
  const after = at < 0 ? undefined : queue[at + 1]
  return (
    <Crumbs
      path={[
        <TextLink key="desk" to={paths.witness}>
          Witness desk
        </TextLink>,
        <b key="sheet" className="hs-fig" aria-current="page">
          {entry.number}
        </b>,
      ]}
      beside={<StateGlyph state={glyphOf(entry.phase)} />}
      acts={
        <>
          {at >= 0 && (
            <span className="hs-quiet">
              {at + 1} of {queue.length} waiting
            </span>
          )}
          {before && <ButtonLink to={reviewPath(before.id)}>Previous</ButtonLink>}
          {after && <ButtonLink to={reviewPath(after.id)}>Next</ButtonLink>}
          <a className="hs-button wide:hidden" href="#review">
            Your review
          </a>
        </>
      }
    />
  )
}

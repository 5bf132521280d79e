import type { ComponentProps, CSSProperties } from 'react'
import type { Entry } from '../../../server/contract/entries.ts'
import type { Notebook } from '../../../server/contract/notebooks.ts'
import { experimentNames } from '../../features/entries/experiments.ts'
import { SealFoot } from '../../features/entries/seal-foot.tsx'
import { BeamStrip } from '../../features/runs/beam-strip.tsx'
import { SignatureList } from '../../features/signatures/index.ts'
import { Sheet, SheetBody, SheetRow } from '../../ui/sheet.tsx'
import { SheetHeading } from '../sheet/sheet-heading.tsx'
import { SheetMargin } from '../sheet/sheet-margin.tsx'
import { SheetText } from '../sheet/sheet-text.tsx'

/** The sheet as its author signed it, to be read; its margin is narrow, since the review stands beside it. */
export function ReviewSheet({
  entry,
  notebook,
  content,
  justSealed,
}: {
  entry: Entry
  notebook: Notebook
  content: ComponentProps<typeof SheetText>['content']
  justSealed: boolean
}) {
  return (
    <Sheet>
      <SheetHeading entry={entry} notebook={notebook} editable={false} />
      <BeamStrip entry={entry} experimentName={experimentNames[entry.experiment]} />
      <div style={{ '--hs-side': '260px' } as CSSProperties}>
        <SheetBody>
          <SheetRow margin={<SheetMargin entry={entry} editable={false} onStandardSet={null} />}>
            <SheetText entry={entry} content={content} />
          </SheetRow>
        </SheetBody>
      </div>
      <SealFoot entry={entry} justSealed={justSealed}>
        <SignatureList signatures={entry.signatures} />
      </SealFoot>
    </Sheet>
  )
}

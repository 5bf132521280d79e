import { Tooltip } from '@base-ui/react/tooltip'
import type { ReactElement } from 'react'

/** Help that shows on hover and focus. Own drawing: the browser's title box would be white in a dark room. */
export function Tip({ words, children }: { words: string; children: ReactElement }) {
  return (
    <Tooltip.Root>
      <Tooltip.Trigger delay={300} aria-description={words} render={children} />
      <Tooltip.Portal>
        <Tooltip.Positioner className="hs-popup-layer" sideOffset={6}>
          <Tooltip.Popup className="hs-tip">{words}</Tooltip.Popup>
        </Tooltip.Positioner>
      </Tooltip.Portal>
    </Tooltip.Root>
  )
}

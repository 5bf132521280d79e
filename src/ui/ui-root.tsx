import { CSPProvider } from '@base-ui/react/csp-provider'
import { Tooltip } from '@base-ui/react/tooltip'
import type { ReactNode } from 'react'

/**
 * Goes round the whole interface once. Parts from the kit must not write style elements (our content security policy
 * refuses them), and pictures in the dark-room pass through the red filter kept here.
 */
export function UiRoot({ children }: { children: ReactNode }) {
  return (
    <CSPProvider disableStyleElements>
      <Tooltip.Provider>
        <svg className="hs-filters-store" width="0" height="0" aria-hidden>
          <filter id="hs-red" colorInterpolationFilters="sRGB">
            <feColorMatrix values=".24 .34 .08 0 -.02  0 0 0 0 0  0 0 0 0 0  0 0 0 1 0" />
          </filter>
        </svg>
        {children}
      </Tooltip.Provider>
    </CSPProvider>
  )
}

import katex from 'katex'
import { useEffect, useMemo, useRef } from 'react'
import { mathsOptions } from '../../../server/document/maths.ts'

/** A formula as set by KaTeX; one that cannot be set is shown as typed, with the reason. */
export function Maths({ latex, display }: { latex: string; display: boolean }) {
  const place = useRef<HTMLSpanElement>(null)
  const wrong = useMemo(() => reasonAgainst(latex, display), [latex, display])
  useEffect(() => {
    if (!place.current) return
    if (wrong === null) katex.render(latex, place.current, mathsOptions(display))
    else place.current.textContent = latex
  }, [latex, display, wrong])
  return (
    <>
      <span ref={place} className={wrong ? 'hs-maths-wrong' : undefined} />
      {wrong && (
        <span className="hs-maths-reason" role="status">
          {wrong}
        </span>
      )}
    </>
  )
}

function reasonAgainst(latex: string, display: boolean): string | null {
  try {
    katex.renderToString(latex, mathsOptions(display))
    return null
  } catch (error) {
    return error instanceof Error ? error.message.replace(/^KaTeX parse error: /, '') : 'It cannot be set.'
  }
}

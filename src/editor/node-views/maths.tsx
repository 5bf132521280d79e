import katex from 'katex'
import { useEffect, useRef, useState } from 'react'
import { mathsOptions } from '../../../server/document/maths.ts'

/** A formula as set by KaTeX; one that cannot be set is shown as typed, with the reason. */
export function Maths({ latex, display }: { latex: string; display: boolean }) {
  const place = useRef<HTMLSpanElement>(null)
  const [wrong, setWrong] = useState<string | null>(null)
  useEffect(() => {
    if (!place.current) return
    try {
      katex.render(latex, place.current, mathsOptions(display))
      setWrong(null)
    } catch (error) {
      place.current.textContent = latex
      setWrong(
        error instanceof Error ? error.message.replace(/^KaTeX parse error: /, '') : 'It cannot be set.',
      )
    }
  }, [latex, display])
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

import { useEffect, useRef, useState } from 'react'

/** Width of an element in CSS pixels, followed as it changes. The first value is the guess, until it is measured. */
export function useWidth<E extends HTMLElement>(guess: number): [React.RefObject<E | null>, number] {
  const element = useRef<E>(null)
  const [width, setWidth] = useState(guess)
  useEffect(() => {
    const seen = element.current
    if (!seen || typeof ResizeObserver === 'undefined') return
    const observer = new ResizeObserver(([entry]) => {
      const now = Math.floor(entry?.contentRect.width ?? 0)
      if (now > 0) setWidth(now)
    })
    observer.observe(seen)
    return () => observer.disconnect()
  }, [])
  return [element, width]
}
